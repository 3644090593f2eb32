#pragma once

#include <nlohmann/json.hpp>

#include <filesystem>
#include <map>
#include <string>
#include <vector>

/// Runs the program itself, as a user would.
namespace lightledger::contract {

using Json = nlohmann::ordered_json;
using Arguments = std::vector<std::string>;
/// Variables set for the run; all others are inherited.
using Variables = std::map<std::string, std::string>;

struct Outcome {
  int code = -1; ///< exit code; minus the signal that ended the program
  std::string out, err;
};

/// Runs the program in the project's folder, its output in pipes.
[[nodiscard]] Outcome run(const Arguments& arguments);

/// Runs a line of shell in which `lightledger` is the program.
[[nodiscard]] Outcome run_shell(const std::string& line);

/// Runs the program on a terminal of some columns; `out` holds all that the terminal got.
[[nodiscard]] Outcome run_on_terminal(const Arguments& arguments, int columns,
                                      const Variables& variables = {});

/// What the program writes with `--json -`, which must succeed.
[[nodiscard]] Json json_of(Arguments arguments);

[[nodiscard]] std::vector<std::string> keys_of(const Json& object);

/// A path below the project's folder.
[[nodiscard]] std::string project(const std::string& path);

[[nodiscard]] std::string content(const std::filesystem::path& path);

/// A folder of its own, gone at the end.
class Scratch {
public:
  Scratch();
  ~Scratch();
  Scratch(const Scratch&) = delete;
  Scratch& operator=(const Scratch&) = delete;

  [[nodiscard]] std::string path(const std::string& name) const { return (m_folder / name).string(); }
  /// Writes a file and returns its path.
  [[nodiscard]] std::string file(const std::string& name, const std::string& text) const;
  /// Names of all that stands in the folder, in order.
  [[nodiscard]] std::vector<std::string> names() const;

private:
  std::filesystem::path m_folder;
};

} // namespace lightledger::contract
