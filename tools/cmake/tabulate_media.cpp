// Writes media.yaml as C++ source of constant tables: tabulate_media MEDIA.YAML OUTPUT.CPP

#include <fmt/format.h>
#include <yaml-cpp/yaml.h>

#include <cstdio>
#include <exception>
#include <fstream>
#include <stdexcept>
#include <string>

namespace {

/// Seventeen digits, so that every published number comes back exactly.
std::string exactly(const YAML::Node& number) {
  return fmt::format("{:.17g}", number.as<double>());
}

/// "{1, 2, 3}"
std::string braced(const YAML::Node& numbers) {
  std::string list;
  for (const YAML::Node& number : numbers)
    list += (list.empty() ? "" : ", ") + exactly(number);
  return fmt::format("{{{}}}", list);
}

std::string quoted(const std::string& text) {
  std::string escaped;
  for (const char letter : text) {
    if (letter == '"' || letter == '\\')
      escaped += '\\';
    escaped += letter;
  }
  return fmt::format("\"{}\"", escaped);
}

/// The two parts of the output: the arrays, and the media that refer to them.
class Tables {
public:
  void add(const std::string& name, const YAML::Node& medium) {
    m_entries += fmt::format("    {{{}, {}, {}, Range{},\n     {}}},\n", quoted(name),
                             dispersion(name, medium), transmittance(medium["internal_transmittance"]),
                             braced(medium["range_nm"]), quoted(medium["source"].as<std::string>()));
  }

  [[nodiscard]] std::string source() const {
    return fmt::format("// Made from media.yaml by tools/cmake/tabulate_media.cpp.\n"
                       "#include <optics/builtin.hpp>\n\n"
                       "namespace lightledger::optics {{\nnamespace {{\n\n{}\n"
                       "constexpr BuiltinMedium media[] = {{\n{}}};\n\n}} // namespace\n\n"
                       "constinit const std::span<const BuiltinMedium> tabulated_media{{media}};\n\n"
                       "}} // namespace lightledger::optics\n",
                       m_arrays, m_entries);
  }

private:
  /// Adds an array and returns its name.
  std::string array(const std::string& type, const std::string& content) {
    std::string name = fmt::format("array_{}", m_count++);
    m_arrays += fmt::format("constexpr {} {}[] = {};\n", type, name, content);
    return name;
  }

  std::string numbers(const YAML::Node& values) { return array("double", braced(values)); }

  std::string rows(const std::string& type, const YAML::Node& values) {
    std::string lines;
    for (const YAML::Node& row : values)
      lines += fmt::format("    {},\n", braced(row));
    return array(type + "::Row", fmt::format("{{\n{}}}", lines));
  }

  std::string dispersion(const std::string& name, const YAML::Node& medium) {
    if (const YAML::Node sellmeier = medium["sellmeier"]) {
      const std::string A = sellmeier["A"] ? exactly(sellmeier["A"]) : "1";
      const std::string B = numbers(sellmeier["B"]);
      return fmt::format("SellmeierTerms{{{}, {}, {}}}", A, B, numbers(sellmeier["C_um2"]));
    }
    if (const YAML::Node cauchy = medium["cauchy"])
      return fmt::format("CauchyTerms{{{}}}", numbers(cauchy["A"]));
    if (const YAML::Node table = medium["table"])
      return fmt::format("IndexRows{{{}}}", rows("IndexTable", table));
    throw std::runtime_error(name + " has neither sellmeier nor cauchy nor table");
  }

  std::string transmittance(const YAML::Node& given) {
    if (!given)
      return "TransmittanceRows{}";
    return fmt::format("TransmittanceRows{{{}, {}}}", exactly(given["thickness_mm"]),
                       rows("InternalTransmittance", given["table"]));
  }

  std::string m_arrays;
  std::string m_entries;
  int m_count = 0;
};

void tabulate(const std::string& yaml, const std::string& output) {
  Tables tables;
  for (const auto& medium : YAML::LoadFile(yaml))
    tables.add(medium.first.as<std::string>(), medium.second);
  std::ofstream file{output, std::ios::binary};
  file << tables.source();
  if (!file.flush())
    throw std::runtime_error("cannot write " + output);
}

} // namespace

int main(int count, char** arguments) {
  try {
    if (count != 3)
      throw std::runtime_error("usage: tabulate_media MEDIA.YAML OUTPUT.CPP");
    tabulate(arguments[1], arguments[2]);
    return 0;
  } catch (const std::exception& error) {
    std::fprintf(stderr, "tabulate_media: %s\n", error.what());
    return 1;
  }
}
