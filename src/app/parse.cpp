#include "parse.hpp"

#include "help.hpp"
#include "input_error.hpp"
#include "numbers.hpp"
#include "words.hpp"

#include <lightledger/assembly/diagnostics.hpp>

#include <CLI/Error.hpp>
#include <fmt/format.h>

#include <algorithm>
#include <filesystem>
#include <map>
#include <utility>

namespace lightledger::app {
namespace {

using assembly::Fault;
using assembly::Faults;

[[noreturn]] void refuse(const Faults& faults, const std::string& usage) {
  throw InputError(assembly::describe(faults, "lightledger", "") + usage + '\n');
}

[[noreturn]] void refuse(Fault fault, const std::string& usage) {
  Faults faults;
  faults.add(std::move(fault));
  refuse(faults, usage);
}

bool asks_for_help(std::string_view word) {
  return word == "--help" || word == "-h";
}

const CommandInfo& command_of(const std::string& word) {
  if (const CommandInfo* command = find_command(word))
    return *command;
  if (word.starts_with('-'))
    refuse({{}, fmt::format("'{}' stands where the command should", word), "options after the command", {}},
           program_usage());
  std::vector<std::string_view> known;
  for (const CommandInfo& command : commands())
    known.emplace_back(command.name);
  refuse({{},
          fmt::format("there is no command '{}'", word),
          fmt::format("{}", fmt::join(known, ", ")),
          std::string(assembly::nearest(word, command_names()))},
         program_usage());
}

constexpr std::uint64_t most_paths = 10'000;

/// Turns the words of one command into options, and notes what is wrong with them.
class Reader {
public:
  explicit Reader(Command command) : m_command(command) { m_options.command = command; }

  Options read(const Words& words);
  [[nodiscard]] const Faults& faults() const { return m_faults; }

private:
  void note(std::string message, std::string accepted, std::string suggestion = {}) {
    m_faults.add({{}, std::move(message), std::move(accepted), std::move(suggestion)});
  }

  void read_unknown(const std::vector<std::string>& unknown);
  void read_positionals(const std::vector<std::string>& words);
  void read_changes(const Words& words);
  void read_sampling(const Words& words);
  void read_threads(const std::vector<std::string>& values);
  void read_isa(const std::vector<std::string>& values);
  void read_ghosts(const Words& words);
  void read_split(const std::vector<std::string>& values);
  void read_out(const std::vector<std::string>& values);
  void read_view(const std::vector<std::string>& values);
  void read_ghost(const std::vector<std::string>& values);
  void read_against(const std::vector<std::string>& values);
  std::vector<double> read_steps(const char* option, const std::vector<std::string>& values);

  /// The value of an option that may be given once.
  std::optional<std::string> single(const char* option, const std::vector<std::string>& values);

  Command m_command;
  Options m_options;
  Faults m_faults;
};

Options Reader::read(const Words& words) {
  read_unknown(words.unknown);
  if (words.unknown.empty())
    read_positionals(words.positionals);
  m_options.json = single("--json", words.json);
  m_options.csv = single("--csv", words.csv);
  read_changes(words);
  read_sampling(words);
  read_threads(words.threads);
  read_isa(words.isa);
  m_options.decibels = words.decibels;
  m_options.quiet = words.quiet;
  m_options.allow_outside = words.allow_outside;
  read_ghosts(words);
  read_split(words.split);
  read_against(words.against);
  m_options.maps = single("--maps", words.maps);
  m_options.incident = single("--incident", words.incident);
  m_options.substrate = single("--substrate", words.substrate);
  m_options.wavelengths_nm = read_steps("--wavelengths", words.wavelengths);
  m_options.angles_deg = read_steps("--angles", words.angles);
  read_out(words.out);
  read_view(words.view);
  read_ghost(words.ghost);
  return m_options;
}

void Reader::read_unknown(const std::vector<std::string>& unknown) {
  std::vector<std::string_view> names{"--help"};
  for (const OptionInfo& option : own_options(m_command))
    names.emplace_back(option.name);
  for (const OptionInfo& option : common_options())
    names.emplace_back(option.name);
  for (const std::string& word : unknown) {
    const std::string name = word.substr(0, word.find('='));
    note(fmt::format("{} has no option '{}'", info(m_command).name, name), {},
         std::string(assembly::nearest(name, names)));
  }
}

void Reader::read_positionals(const std::vector<std::string>& words) {
  std::vector<std::string> missing;
  std::size_t next = 0;
  if (m_command != Command::media) {
    if (next < words.size())
      m_options.file = words[next++];
    else
      missing.emplace_back("FILE");
  }
  if (m_command == Command::coating || m_command == Command::media) {
    if (next < words.size())
      m_options.name = words[next++];
    else if (m_command == Command::coating)
      missing.emplace_back("NAME");
  }
  if (!missing.empty())
    note(fmt::format("{} needs {}", info(m_command).name, fmt::join(missing, " and ")), {});
  for (; next < words.size(); ++next)
    note(fmt::format("'{}' is one argument too many", words[next]), {});
}

std::optional<std::string> Reader::single(const char* option, const std::vector<std::string>& values) {
  if (values.empty())
    return std::nullopt;
  if (values.size() > 1)
    note(fmt::format("{} is given {} times", option, values.size()), "one");
  else if (values.front().empty())
    note(fmt::format("{} needs a value", option), {});
  else
    return values.front();
  return std::nullopt;
}

void Reader::read_changes(const Words& words) {
  for (const std::string& word : words.set) {
    const std::size_t equals = word.find('=');
    if (equals == std::string::npos || equals == 0)
      note(fmt::format("--set '{}' names no value", word), "PATH=VALUE, as fold.tilt=[44,0,0]");
    else
      m_options.changes.push_back({word.substr(0, equals), word.substr(equals + 1)});
  }
}

void Reader::read_sampling(const Words& words) {
  constexpr std::uint64_t most_rays = std::uint64_t{1} << 32U;
  const std::optional<std::string> rays = single("--rays", words.rays);
  const std::optional<std::string> accuracy = single("--accuracy", words.accuracy);
  if (rays && accuracy)
    note("--rays and --accuracy exclude each other", "one of the two");
  if (rays) {
    if (const auto count = whole_number(*rays, 1, most_rays))
      m_options.changes.push_back({"light.rays", fmt::format("{{pattern: scattered, count: {}}}", *count)});
    else
      note(fmt::format("--rays '{}' is no count of rays", *rays), "a whole number from 1 to 2^32");
  }
  if (accuracy) {
    if (const auto error = finite_number(*accuracy); error && *error > 0.0)
      m_options.changes.push_back({"light.rays", fmt::format("{{accuracy: {}}}", *error)});
    else
      note(fmt::format("--accuracy '{}' is no standard error", *accuracy), "a number above 0");
  }
}

void Reader::read_threads(const std::vector<std::string>& values) {
  constexpr std::uint64_t most_threads = 1024;
  const std::optional<std::string> word = single("--threads", values);
  if (!word)
    return;
  if (const auto count = whole_number(*word, 1, most_threads))
    m_options.threads = static_cast<int>(*count);
  else
    note(fmt::format("--threads '{}' is no count of threads", *word), "a whole number from 1 to 1024");
}

void Reader::read_isa(const std::vector<std::string>& values) {
  std::string from = "--isa";
  std::optional<std::string> word = single("--isa", values);
  if (!word) {
    const char* environment = std::getenv("LIGHTLEDGER_ISA");
    if (environment == nullptr || *environment == '\0')
      return;
    from = "LIGHTLEDGER_ISA";
    word = environment;
  }
  std::string available;
  for (const trace::InstructionSet set : trace::instruction_sets) {
    if (!trace::available(set))
      continue;
    if (*word == trace::name(set))
      m_options.isa = set;
    available += (available.empty() ? "" : ", ") + std::string(trace::name(set));
  }
  if (!m_options.isa)
    note(fmt::format("{}: this machine has no instruction set '{}'", from, *word), available);
}

void Reader::read_ghosts(const Words& words) {
  analysis::GhostOptions& ghosts = m_options.ghosts;
  if (const auto bounces = single("--bounces", words.bounces)) {
    if (*bounces == "2" || *bounces == "4")
      ghosts.bounces = *bounces == "2" ? 2 : 4;
    else
      note(fmt::format("--bounces '{}' is not followed", *bounces), "2, 4");
  }
  if (const auto floor = single("--floor", words.floor)) {
    const auto share = finite_number(*floor);
    if (share && *share >= 0.0 && *share < 1.0)
      ghosts.floor = *share;
    else
      note(fmt::format("--floor '{}' is no share of power", *floor), "a number from 0 to below 1");
  }
  if (const auto top = single("--top", words.top)) {
    ghosts.top = whole_number(*top, 1, most_paths);
    if (!ghosts.top)
      note(fmt::format("--top '{}' is no count of paths", *top), "a whole number from 1 to 10 000");
  }
  ghosts.field = single("--field", words.field);
  m_options.images = single("--images", words.images);
  m_options.returned = words.returned;
}

void Reader::read_split(const std::vector<std::string>& values) {
  const std::optional<std::string> word = single("--split", values);
  if (!word)
    return;
  if (*word == "wavelength")
    m_options.split = analysis::Split::wavelength;
  else if (*word == "field")
    m_options.split = analysis::Split::field;
  else
    note(fmt::format("--split '{}' is no way to split", *word), "wavelength, field",
         std::string(assembly::nearest(*word, {"wavelength", "field"})));
}

/// Beside the place asked for, the name of the file in the current folder.
void Reader::read_out(const std::vector<std::string>& values) {
  m_options.out = single("--out", values);
  const char* ending = m_command == Command::draw ? ".svg" : m_command == Command::report ? ".html" : nullptr;
  if (values.empty() && ending != nullptr)
    m_options.out = std::filesystem::path(m_options.file).stem().string() + ending;
}

void Reader::read_view(const std::vector<std::string>& values) {
  using analysis::View;
  static const std::map<std::string_view, std::vector<View>> views{
      {"x", {View::x}}, {"y", {View::y}}, {"z", {View::z}}, {"all", {View::x, View::y, View::z}}};
  const std::optional<std::string> word = single("--view", values);
  if (!word)
    return;
  if (const auto found = views.find(*word); found != views.end())
    m_options.views = found->second;
  else
    note(fmt::format("--view '{}' is no view", *word), "x, y, z, all");
}

void Reader::read_ghost(const std::vector<std::string>& values) {
  constexpr std::uint64_t most_ghosts = 10'000;
  const std::optional<std::string> word = single("--ghost", values);
  if (!word)
    return;
  m_options.ghost = whole_number(*word, 1, most_ghosts);
  if (!m_options.ghost)
    note(fmt::format("--ghost '{}' is no rank of a ghost", *word), "a whole number from 1 to 10000");
}

void Reader::read_against(const std::vector<std::string>& values) {
  const std::optional<std::string> word = single("--against", values);
  if (!word)
    return;
  if (*word == "wavelength")
    m_options.against = analysis::Against::wavelength;
  else if (*word == "angle")
    m_options.against = analysis::Against::angle;
  else
    note(fmt::format("--against '{}' is nothing to set the figures against", *word), "wavelength, angle",
         std::string(assembly::nearest(*word, {"wavelength", "angle"})));
}

std::vector<double> Reader::read_steps(const char* option, const std::vector<std::string>& values) {
  constexpr std::size_t most_values = 100'000;
  const std::optional<std::string> word = single(option, values);
  if (!word)
    return {};
  if (auto list = steps(*word, most_values))
    return *list;
  note(fmt::format("{} '{}' is no range of numbers", option, *word),
       "START:STOP:STEP with STEP above 0 and at most 100 000 values, or one number");
  return {};
}

} // namespace

std::variant<std::string, Options> parse(const std::vector<std::string>& arguments) {
  if (arguments.empty())
    refuse({{}, "no command is given", {}, {}}, program_usage());
  const std::string& first = arguments.front();
  if (asks_for_help(first))
    return program_help();
  if (first == "--version")
    return std::string("lightledger " LIGHTLEDGER_VERSION "\n");
  const CommandInfo& command = command_of(first);
  if (std::ranges::any_of(arguments, asks_for_help))
    return command_help(command);

  Reader reader(command.command);
  Options options;
  try {
    options = reader.read(sort_words(command.command, {arguments.begin() + 1, arguments.end()}));
  } catch (const CLI::ParseError&) {
    refuse({{}, "a switch takes no value", "--db, --quiet, --returned or --allow-outside alone", {}},
           command_usage(command));
  }
  if (!reader.faults().none())
    refuse(reader.faults(), command_usage(command));
  return options;
}

} // namespace lightledger::app
