#include "app/completions.hpp"
#include "app/man_page.hpp"

#include <cstdio>
#include <fstream>
#include <string>

namespace {

bool write(const std::string& path, const std::string& text) {
  std::ofstream file(path, std::ios::binary);
  file << text;
  file.close();
  return !file.fail();
}

} // namespace

/// Writes what stands beside the program when it is installed: write_companions FOLDER.
int main(int count, char** arguments) {
  using namespace lightledger::app;
  if (count != 2)
    return 2;
  const std::string folder = std::string(arguments[1]) + '/';
  const bool done = write(folder + "lightledger.1", man_page()) &&
                    write(folder + "lightledger.bash", bash_completion()) &&
                    write(folder + "_lightledger", zsh_completion()) &&
                    write(folder + "lightledger.fish", fish_completion());
  if (!done)
    std::fprintf(stderr, "write_companions: cannot write into %s\n", arguments[1]);
  return done ? 0 : 1;
}
