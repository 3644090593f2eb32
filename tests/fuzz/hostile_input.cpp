#include "fuzz/hostile_input.hpp"

#include <lightledger/assembly/load.hpp>
#include <lightledger/trace/tracer.hpp>

#include <fmt/format.h>

#include <array>
#include <cmath>
#include <cstdlib>
#include <filesystem>
#include <fstream>
#include <initializer_list>
#include <stdexcept>
#include <string>
#include <system_error>
#include <utility>
#include <vector>

namespace lightledger::fuzz {
namespace {

using assembly::Assembly;
using assembly::Loaded;
using trace::Entry;

constexpr std::string_view change_word = "# set ";
constexpr std::string_view curves_line = "\n# curves.csv\n";
constexpr const char* curves_name = "curves.csv";

constexpr std::size_t largest_report = 40'000;
constexpr double closes = 1e-9;

/// What is larger takes its time by right and teaches nothing new.
constexpr std::size_t most_stations = 200;
constexpr std::size_t most_fields = 3;
constexpr std::size_t most_films = 500;
constexpr std::uint64_t few_rays = 16;

void promise(bool kept, const std::string& what) {
  if (!kept)
    throw std::logic_error(what);
}

/// A folder of this process alone, empty but for the file that an input brings along.
class Folder {
public:
  Folder() {
    std::string name = (std::filesystem::temp_directory_path() / "hostile-XXXXXX").string();
    if (mkdtemp(name.data()) == nullptr)
      throw std::runtime_error("no folder for temporary files");
    m_path = name;
  }
  Folder(const Folder&) = delete;
  Folder& operator=(const Folder&) = delete;
  ~Folder() {
    std::error_code ignored;
    std::filesystem::remove_all(m_path, ignored);
  }

  [[nodiscard]] const std::filesystem::path& path() const { return m_path; }
  void put(std::string_view content) const {
    std::ofstream file(m_path / curves_name, std::ios::binary);
    file.write(content.data(), static_cast<std::streamsize>(content.size()));
  }
  void clear() const { std::filesystem::remove(m_path / curves_name); }

private:
  std::filesystem::path m_path;
};

/// The changes that the first lines ask for.
std::vector<assembly::Change> changes_in(std::string_view text) {
  std::vector<assembly::Change> changes;
  while (text.starts_with(change_word)) {
    const std::size_t end = std::min(text.find('\n'), text.size());
    const std::string_view change = text.substr(change_word.size(), end - change_word.size());
    const std::size_t equals = std::min(change.find('='), change.size());
    changes.push_back({std::string(change.substr(0, equals)),
                       std::string(change.substr(std::min(equals + 1, change.size())))});
    text.remove_prefix(std::min(end + 1, text.size()));
  }
  return changes;
}

Loaded load(std::string_view bytes) {
  static const Folder folder;
  const std::size_t split = bytes.find(curves_line);
  const bool has_curves = split != std::string_view::npos;
  const std::string_view text = bytes.substr(0, has_curves ? split + 1 : bytes.size());
  if (has_curves)
    folder.put(bytes.substr(split + curves_line.size()));
  Loaded loaded =
      assembly::load_text("hostile.yaml", std::string(text), changes_in(text), {folder.path(), false});
  if (has_curves)
    folder.clear();
  return loaded;
}

std::size_t films(const Assembly& assembly) {
  std::size_t count = 0;
  for (const assembly::Coating& coating : assembly.coatings)
    if (const auto* layers = std::get_if<assembly::Layers>(&coating.kind))
      count += layers->films.size();
  return count;
}

/// The first wavelength, a few fields and rays: a train of every kind in a moment.
Assembly curtailed(Assembly assembly) {
  assembly::Light& light = assembly.light;
  light.wavelengths.resize(1, light.wavelengths.front());
  light.wavelengths.front().weight = 1.0;
  if (light.fields.size() > most_fields)
    light.fields.resize(most_fields);
  for (assembly::Field& field : light.fields)
    field.weight = 1.0;
  light.sampling = assembly::Scattered{few_rays};
  return assembly;
}

void check_finite(const Entry& entry, std::size_t station) {
  for (const double power : {entry.incident, entry.missed, entry.clipped, entry.onward, entry.aside,
                             entry.absorbed, entry.scattered, entry.extra, entry.bulk, entry.backward,
                             entry.extrapolated, entry.inside, entry.pass_s, entry.pass_p, entry.incidence})
    promise(std::isfinite(power), fmt::format("row {} of the ledger holds {}", station, power));
}

void check_traced(const trace::Traced& traced) {
  for (std::size_t station = 0; station < traced.total.rows.size(); ++station)
    check_finite(traced.total.rows[station], station);
  const double closure = traced.total.closure_error();
  promise(std::abs(closure) < closes, fmt::format("the ledger misses {}", closure));
  const double error = traced.standard_error.value_or(0.0);
  promise(std::isfinite(error), fmt::format("the standard error is {}", error));
}

void check_report(const assembly::Faults& faults, std::string_view file, std::string_view text) {
  const std::size_t size = assembly::describe(faults, file, text).size();
  promise(size > 0 && size < largest_report, fmt::format("a report of {} bytes", size));
}

} // namespace

void take(std::string_view bytes) {
  Loaded loaded = load(bytes);
  promise(loaded.faults.none() == loaded.assembly.has_value(), "neither an assembly nor faults, or both");
  if (!loaded.assembly)
    return check_report(loaded.faults, loaded.file, loaded.text);
  if (loaded.assembly->stations.size() > most_stations || films(*loaded.assembly) > most_films)
    return;
  const Assembly assembly = curtailed(std::move(*loaded.assembly));
  assembly::Faults faults;
  const auto train = trace::prepare(assembly, faults);
  promise(faults.none() == train.has_value(), "neither a train nor faults, or both");
  if (!train)
    return check_report(faults, loaded.file, loaded.text);
  check_traced(trace::trace(*train, {.threads = 1}));
}

} // namespace lightledger::fuzz
