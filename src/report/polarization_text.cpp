#include "display_width.hpp"
#include "figures.hpp"
#include "polarization_words.hpp"
#include "prose.hpp"
#include "table.hpp"

#include <lightledger/report/polarization.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace lightledger::report {
namespace {

using analysis::Against;
using analysis::Attribution;
using analysis::ChiefRay;
using analysis::DetectorFigures;
using analysis::Polarization;
using assembly::Assembly;

constexpr int number_width = 3;

int name_width(const TextStyle& style) {
  return style.width / 4;
}

std::string power(double value, const TextStyle& style) {
  return style.decibels ? decibels(value) : fraction(value);
}

std::string chief_table(const ChiefRay& chief, const TextStyle& style) {
  Table table({{"", Align::right, number_width},
               {"station", Align::left},
               {"S0", Align::right, 6},
               {"DoP", Align::right, 6},
               {"azimuth", Align::right, 7},
               {"elliptic.", Align::right, 7},
               {"diatten.", Align::right, 7},
               {"retard.", Align::right, 7}});
  for (std::size_t i = 0; i < chief.stations.size(); ++i) {
    const analysis::ChiefStation& station = chief.stations[i];
    const bool retards = station.retardance_deg && *station.retardance_deg > 1e-9;
    table.add({std::to_string(i + 1), shortened(on_one_line(station.name), name_width(style)),
               power(station.stokes[0], style), share(station.dop), azimuth(station.azimuth_deg),
               angle(station.ellipticity_deg), share(station.diattenuation),
               retards ? angle(station.retardance_deg) : "-"});
  }
  return table.text(style.emphasis);
}

std::string chief_part(const std::optional<ChiefRay>& chief, const TextStyle& style) {
  if (!chief)
    return wrapped("There is no chief ray: it misses a surface or is totally reflected.", style.width);
  const std::string heading =
      fmt::format("Chief ray {}: its state behind each station, and what that station alone does. Angles in "
                  "degrees; ellipticity above 0 is right-handed (IEEE).",
                  place_of(*chief));
  const std::string total =
      fmt::format("In all: diattenuation {}, retardance {} deg, image rotation {} deg.",
                  share(chief->diattenuation), angle(chief->retardance_deg), angle(chief->rotation_deg));
  return wrapped(heading, style.width) + '\n' + chief_table(*chief, style) + wrapped(total, style.width);
}

struct DetectorLine {
  const char* words;
  std::optional<double> DetectorFigures::*figure;
  const char* unit;
};

constexpr std::array<DetectorLine, 13> detector_lines{
    {{"degree of polarization", &DetectorFigures::dop, ""},
     {"azimuth", &DetectorFigures::azimuth_deg, "deg"},
     {"ellipticity (> 0: right, IEEE)", &DetectorFigures::ellipticity_deg, "deg"},
     {"cross leakage", &DetectorFigures::cross_leakage, ""},
     {"linear extinction", &DetectorFigures::linear_extinction, ": 1"},
     {"extinction", &DetectorFigures::extinction, ": 1"},
     {"diattenuation", &DetectorFigures::diattenuation, ""},
     {"polarizance", &DetectorFigures::polarizance, ""},
     {"retardance", &DetectorFigures::retardance_deg, "deg"},
     {"image rotation", &DetectorFigures::rotation_deg, "deg"},
     {"depolarization index", &DetectorFigures::depolarization_index, ""},
     {"depolarization (Lu-Chipman)", &DetectorFigures::depolarization, ""},
     {"coherent share", &DetectorFigures::coherent_share, ""}}};

std::string detector_value(double value, const DetectorLine& line) {
  const std::string_view unit = line.unit;
  if (unit == ": 1")
    return quantity(value);
  if (line.figure == &DetectorFigures::azimuth_deg)
    return azimuth(value);
  return unit == "deg" ? angle(value) : share(value);
}

/// Rounding has no error worth a column.
std::string error_words(std::optional<double> error) {
  return error && *error > 1e-12 ? "+- " + error_size(*error) : "";
}

std::string detector_table(const Polarization& polarization, const TextStyle& style) {
  Table table({{"all light at the detector", Align::left}, {""}, {"", Align::left}, {"", Align::left}});
  table.add({"transmitted of unpolarized light", power(polarization.detector.mueller[0][0], style),
             style.decibels ? "dB" : "",
             error_words(polarization.uncertainty && !style.decibels
                             ? std::optional(polarization.error.mueller[0][0])
                             : std::nullopt)});
  for (const DetectorLine& line : detector_lines)
    if (const auto value = polarization.detector.*line.figure)
      table.add({line.words, detector_value(*value, line), line.unit,
                 error_words(polarization.error.*line.figure)});
  return table.text(style.emphasis);
}

std::string mueller_lines(const optics::Mueller& m) {
  if (!(m[0][0] > 0.0))
    return "";
  std::string lines = "Mueller matrix over M00\n";
  for (const auto& row : m) {
    for (const double element : row) {
      const double relative = element / m[0][0];
      lines += fmt::format("  {:8.4f}", std::abs(relative) < 0.5e-4 ? 0.0 : relative);
    }
    lines += '\n';
  }
  return lines;
}

std::string attribution_table(const char* heading, const std::vector<Attribution>& attributions,
                              bool numbered, const TextStyle& style) {
  std::vector<Column> columns{{"", Align::right, number_width}, {heading, Align::left}};
  for (const Blame& blame : blames)
    columns.push_back({blame.heading, Align::right, 8});
  Table table(columns);
  for (std::size_t i = 0; i < attributions.size(); ++i) {
    std::vector<Cell> cells{numbered ? std::to_string(i + 1) : "",
                            shortened(on_one_line(attributions[i].name), name_width(style))};
    for (const Blame& blame : blames)
      cells.emplace_back(signed_figure(attributions[i].value.*blame.figure, blame.angle));
    table.add(std::move(cells));
  }
  return table.text(style.emphasis);
}

std::string attribution_part(const Polarization& polarization, const TextStyle& style) {
  std::string text =
      wrapped("Who does it: figures of the train minus those with one station neutral (for all "
              "light; below zero: neutral alone, it would be worse).",
              style.width);
  text += '\n' + attribution_table("station", polarization.attribution, true, style);
  if (!polarization.by_element.empty())
    text += '\n' + attribution_table("element", polarization.by_element, false, style);
  if (!polarization.by_coating.empty())
    text += '\n' + attribution_table("coating", polarization.by_coating, false, style);
  return text;
}

std::string against_part(const assembly::Light& light, const analysis::PolarizationTable& table,
                         const TextStyle& style) {
  if (table.against == Against::nothing)
    return "";
  const char* const field = light.object_distance ? "field mm" : "field deg";
  Table lines({{table.against == Against::wavelength ? "wavelength nm" : field},
               {"delivered"},
               {"DoP"},
               {"azimuth", Align::right, 7},
               {"elliptic.", Align::right, 7},
               {"diatten."},
               {"retard.", Align::right, 7}});
  for (const analysis::PolarizationRow& row : table.rows)
    lines.add({plain(row.at), share(row.delivered), share(row.dop), azimuth(row.azimuth_deg),
               angle(row.ellipticity_deg), share(row.diattenuation), angle(row.retardance_deg)});
  return '\n' + lines.text(style.emphasis);
}

std::string coherent_sentence() {
  return "The coherent share is what a receiver of a single mode, or a heterodyne one, could take of the "
         "arriving "
         "light, its mode everywhere in the launched state as mirrors and lenses of no coating would carry "
         "it, "
         "averaged over launched states: it tells of polarization and of the phases of coatings, not of "
         "wavefront errors, of pointing, or of the size of the mode.";
}

} // namespace

std::string polarization_text(const Assembly& assembly, const Polarization& polarization,
                              const std::vector<std::string>& warnings, std::chrono::duration<double> elapsed,
                              const TextStyle& style) {
  std::string text = heading(assembly, style.width) + '\n';
  text += chief_part(polarization.chief, style) + '\n';
  text += detector_table(polarization, style);
  text += fmt::format("{} rays, {}\n\n", count(polarization.rays), duration(elapsed.count()));
  text += mueller_lines(polarization.detector.mueller);
  text += wrapped(axes_sentence(polarization), style.width) + '\n';
  text += attribution_part(polarization, style) + '\n';
  for (const std::string& sentence : blame_sentences(assembly, polarization))
    text += wrapped(sentence, style.width);
  for (const std::string& sentence : remedy_sentences(assembly, polarization))
    text += wrapped(sentence, style.width);
  if (polarization.detector.coherent_share)
    text += wrapped(coherent_sentence(), style.width);
  text += against_part(assembly.light, polarization.table, style);
  return text + describe_warnings(warnings, style.width);
}

} // namespace lightledger::report
