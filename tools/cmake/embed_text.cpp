// Embeds text files as string constants: embed_text OUT HEADER NAMESPACE (NAME FILE...)..., each NAME given
// as `name=`. The files of a name are joined.

#include <cstdio>
#include <fstream>
#include <iterator>
#include <stdexcept>
#include <string>
#include <vector>

namespace {

std::string content(const std::string& path) {
  std::ifstream file(path, std::ios::binary);
  if (!file)
    throw std::runtime_error(path + " cannot be read");
  return {std::istreambuf_iterator<char>(file), {}};
}

/// As adjacent raw literals, none longer than every compiler takes.
std::string literal(const std::string& text) {
  constexpr std::size_t longest = 60'000;
  std::string literals;
  for (std::size_t start = 0; start == 0 || start < text.size(); start += longest)
    literals += "R\"embedded(" + text.substr(start, longest) + ")embedded\"\n";
  return literals;
}

struct Entry {
  std::string name, text;
};

std::vector<Entry> entries(const std::vector<std::string>& words) {
  std::vector<Entry> list;
  for (const std::string& word : words)
    if (word.ends_with('='))
      list.push_back({word.substr(0, word.size() - 1), {}});
    else if (list.empty())
      throw std::runtime_error("a name must come before " + word);
    else
      list.back().text += content(word);
  return list;
}

} // namespace

int main(int count, char** arguments) {
  try {
    if (count < 5)
      throw std::runtime_error("usage: embed_text OUT HEADER NAMESPACE NAME= FILE...");
    std::ofstream out(arguments[1], std::ios::binary);
    out << "#include <" << arguments[2] << ">\n\nnamespace " << arguments[3] << " {\n\n";
    for (const Entry& entry : entries({arguments + 4, arguments + count}))
      out << "const std::string_view " << entry.name << " =\n" << literal(entry.text) << ";\n\n";
    out << "} // namespace " << arguments[3] << '\n';
    return out.flush() ? 0 : 1;
  } catch (const std::exception& error) {
    std::fprintf(stderr, "embed_text: %s\n", error.what());
    return 1;
  }
}
