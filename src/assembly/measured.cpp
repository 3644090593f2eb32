#include "measured.hpp"

#include "curve_grid.hpp"
#include "plain_text.hpp"
#include "read_file.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <filesystem>
#include <system_error>
#include <utility>

namespace lightledger::assembly {

namespace {

constexpr std::string_view forms =
    "curves.csv, or {file: curves.csv, from: MEDIUM, phases: delay|advance, shift_index: n}";

bool inside(const std::filesystem::path& folder, const std::filesystem::path& path) {
  return std::mismatch(folder.begin(), folder.end(), path.begin(), path.end()).first == folder.end();
}

std::string_view words(Unreadable why) {
  switch (why) {
  case Unreadable::missing:
    return ": there is no such file";
  case Unreadable::folder:
    return ": this is a folder, not a file";
  case Unreadable::too_large:
    return ": the files of measured curves are larger than 8 MB";
  case Unreadable::refused:
    break;
  }
  return ": the file cannot be read";
}

} // namespace

Measured MeasuredCurves::read(Value value, std::string_view coating, WrittenCurves& written) {
  written.mark = m_reader.mark(value);
  const std::size_t before = m_reader.fault_count();
  const Options options = read_options(value, written);
  const auto name = options.file ? m_reader.name(*options.file) : std::nullopt;
  if (!name || m_reader.fault_count() != before)
    return {};
  written.file = *name;
  CurveFaults faults(m_reader, written.mark, *name);
  const auto text = read_text(*options.file, faults);
  if (!text)
    return {};
  CurveTable table = read_curve_table(*text, faults);
  if (!faults.none())
    return {};
  Measured measured = curve_grid(std::move(table), options.advance, faults);
  measured.from = options.from;
  measured.shift_index = options.shift_index;
  if (faults.none())
    check_options(options, measured, faults);
  if (!measured.has_phases)
    m_warnings.push_back(fmt::format("coating {}: {} gives no phases; those of an ideal coating are taken",
                                     quoted(coating), quoted(*name)));
  return measured;
}

MeasuredCurves::Options MeasuredCurves::read_options(Value value, WrittenCurves& written) {
  Options options;
  if (m_reader.node(value).kind == Node::Kind::scalar) {
    options.file = value;
    return options;
  }
  if (auto mapping = Mapping::read(m_reader, value, "a measured coating", forms)) {
    read_keys(*mapping, options, written);
    mapping->finish();
  }
  return options;
}

void MeasuredCurves::read_keys(Mapping& mapping, Options& options, WrittenCurves& written) {
  options.file = mapping.need("file");
  if (const auto from = mapping.take("from")) {
    written.from_mark = m_reader.mark(*from);
    options.from = m_media.named(*from);
  }
  if (const auto phases = mapping.take("phases")) {
    options.phases = mapping.key_mark("phases");
    options.advance = m_reader.word(*phases, {"delay", "advance"}) == "advance";
  }
  options.shift_index = mapping.number("shift_index", Unit::none, Bound::positive);
  options.shift_mark = mapping.key_mark("shift_index");
  if (options.shift_index && *options.shift_index < 1.0)
    m_reader.fault(options.shift_mark, "'shift_index' is below 1, the index of air",
                   "the effective index of the filter");
}

/// The file is looked for from the folder on, links followed, and must lie in it.
std::optional<std::string> MeasuredCurves::read_text(Value file, CurveFaults& faults) {
  if (++m_count > most_files) {
    if (m_count == most_files + 1)
      faults.add(fmt::format(": the file has more than {} measured coatings", most_files));
    return std::nullopt;
  }
  std::error_code error;
  const auto folder = std::filesystem::weakly_canonical(m_files.folder, error);
  const auto path = std::filesystem::weakly_canonical(m_files.folder / m_reader.node(file).scalar, error);
  if (!m_files.allow_outside && !error && !inside(folder, path)) {
    faults.add(" lies outside the folder of the assembly file", "a file in that folder, or --allow-outside");
    return std::nullopt;
  }
  const auto type = std::filesystem::status(path, error).type();
  const bool device = type != std::filesystem::file_type::regular &&
                      type != std::filesystem::file_type::directory &&
                      type != std::filesystem::file_type::not_found;
  auto content = device ? Unreadable::refused : read_file(path, most_bytes - m_bytes);
  if (auto* const text = std::get_if<std::string>(&content)) {
    m_bytes += text->size();
    return std::move(*text);
  }
  faults.add(words(std::get<Unreadable>(content)));
  return std::nullopt;
}

void MeasuredCurves::check_options(const Options& options, const Measured& measured,
                                   const CurveFaults& faults) {
  if (options.phases && !measured.has_phases)
    m_reader.fault(*options.phases, fmt::format("'phases' is given, but {} has none", quoted(faults.file())),
                   "phase_rs_deg, phase_rp_deg, phase_ts_deg, phase_tp_deg");
  if (options.shift_index && measured.angles_deg.size() != 1)
    m_reader.fault(options.shift_mark, fmt::format("'shift_index' goes with curves at one angle; {} has {}",
                                                   quoted(faults.file()), measured.angles_deg.size()));
}

} // namespace lightledger::assembly
