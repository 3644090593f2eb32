#include "polarization_words.hpp"

#include "display_width.hpp"
#include "figures.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace lightledger::report {
namespace {

using analysis::Attribution;
using analysis::Polarization;
using assembly::Assembly;

/// A figure below this is rounding.
constexpr double nothing = 1e-12;
/// Blame below these is not spoken of.
constexpr double noticeable_share = 1e-4;
constexpr double noticeable_deg = 0.05;

double noticeable(const Blame& blame) {
  return blame.angle ? noticeable_deg : noticeable_share;
}

std::string name_of(const Assembly& assembly, std::size_t station) {
  return on_one_line(assembly.stations[station].name);
}

bool is_interface(const Assembly& assembly, const Attribution& attribution) {
  const assembly::Surface& surface =
      assembly.surfaces[assembly.stations[attribution.stations.front()].surface];
  return std::holds_alternative<assembly::Interface>(surface.effect);
}

std::string with_unit(double value, const Blame& blame) {
  return blame.angle ? fmt::format("{:.2f} deg", value) : fmt::format("{:.4f}", value);
}

/// A later station is worse than an earlier one only by more than rounding.
constexpr double worse = 1.0 + 1e-6;

/// The interface that brings the most of a figure, or with `sign` −1 takes the most of it back; plates and
/// polarizers are meant to act.
const Attribution* extreme(const Assembly& assembly, const Polarization& polarization, const Blame& blame,
                           double sign) {
  const Attribution* found = nullptr;
  double most = noticeable(blame);
  for (const Attribution& attribution : polarization.attribution) {
    const double value = sign * (attribution.value.*blame.figure).value_or(0.0);
    if (value > most * worse && is_interface(assembly, attribution)) {
      most = value;
      found = &attribution;
    }
  }
  return found;
}

/// The coating at several stations that brings more of a figure than its worst station does.
std::string coating_clause(const Polarization& polarization, const Attribution& worst, const Blame& blame) {
  for (const Attribution& coating : polarization.by_coating) {
    const double value = (coating.value.*blame.figure).value_or(0.0);
    const bool concerned =
        std::ranges::find(coating.stations, worst.stations.front()) != coating.stations.end();
    if (concerned && coating.stations.size() > 1 && value > *(worst.value.*blame.figure) * worse)
      return fmt::format("; all of its coating {} bring {}", on_one_line(coating.name),
                         with_unit(value, blame));
  }
  return "";
}

std::string vector_words(const std::array<double, 3>& v) {
  const auto component = [](double value) { return plain(std::abs(value) < 5e-7 ? 0.0 : value); };
  return fmt::format("({}, {}, {})", component(v[0]), component(v[1]), component(v[2]));
}

std::string angles_words(const std::array<double, 3>& angles_deg) {
  const auto word = [](double degrees) { return plain(std::abs(degrees) < 5e-7 ? 0.0 : degrees); };
  return fmt::format("[{}, {}, {}]", word(angles_deg[0]), word(angles_deg[1]), word(angles_deg[2]));
}

std::string fold_sentence(const Assembly& assembly, const analysis::FoldTurn& turn) {
  return fmt::format(
      "Turning {} and all behind it by {:.2f} deg about the axis that arrives there (tilt: {}, turn: {}) "
      "brings what mirrors and lenses retard the chief ray from {:.2f} to {:.2f} deg.",
      name_of(assembly, turn.station), turn.turn_deg, angles_words(turn.tilt_deg),
      angles_words(turn.turn_after_deg), turn.retardance_now_deg, turn.retardance_deg);
}

std::string plates_sentence(const Assembly& assembly, const analysis::PlateSettings& settings) {
  std::vector<std::string> clauses;
  for (const auto& plate : settings.plates)
    clauses.push_back(fmt::format("{} to {:.2f} deg (now {})", name_of(assembly, plate.station),
                                  plate.axis_deg, plain(plate.axis_now_deg)));
  const std::string outcome = settings.cross_leakage < 0.5 * noticeable_share
                                  ? "the chief ray arrives in the launched state"
                                  : "the chief ray arrives nearer to the launched state";
  return fmt::format("Setting {}, {}: its cross leakage falls from {} to {}.", fmt::join(clauses, " and "),
                     outcome, share(settings.cross_leakage_now),
                     share(std::max(settings.cross_leakage, 1e-9)));
}

} // namespace

std::string share(std::optional<double> value) {
  if (!value || std::abs(*value) < nothing)
    return "-";
  return fraction(*value);
}

std::string angle(std::optional<double> degrees) {
  if (!degrees)
    return "-";
  return fmt::format("{:.2f}", std::abs(*degrees) < 0.005 ? 0.0 : *degrees);
}

std::string azimuth(std::optional<double> degrees) {
  const std::string text = angle(degrees);
  return text == "-90.00" ? "90.00" : text;
}

std::string signed_figure(std::optional<double> value, bool is_angle) {
  if (!value || std::abs(*value) < (is_angle ? 1e-9 : nothing))
    return "-";
  if (is_angle)
    return std::abs(*value) < 0.005 ? "<0.01" : fmt::format("{:+.2f}", *value);
  return std::abs(*value) < 0.5e-4 ? "<0.0001" : fmt::format("{:+.4f}", *value);
}

std::string place_of(const analysis::ChiefRay& chief) {
  const std::string wavelength = fmt::format("at {} nm", plain(chief.wavelength_nm));
  return chief.field ? fmt::format("{}, field {}", wavelength, on_one_line(*chief.field)) : wavelength;
}

std::string axes_sentence(const Polarization& polarization) {
  return fmt::format(
      "At the detector x points along {} of the bench and y along {}. Right is that of IEEE: for "
      "an observer who faces the source the field turns counter-clockwise.",
      vector_words(polarization.detector_axes[0]), vector_words(polarization.detector_axes[1]));
}

std::vector<std::string> blame_sentences(const Assembly& assembly, const Polarization& polarization) {
  std::vector<std::string> sentences;
  std::vector<std::string> clauses;
  for (const Blame& blame : blames)
    if (const Attribution* guilty = extreme(assembly, polarization, blame, 1.0))
      clauses.push_back(fmt::format("for {} {} ({}{})", blame.words, on_one_line(guilty->name),
                                    with_unit(*(guilty->value.*blame.figure), blame),
                                    coating_clause(polarization, *guilty, blame)));
  if (!clauses.empty())
    sentences.push_back(fmt::format("Most to blame: {}.", fmt::join(clauses, ", ")));
  for (const Blame& blame : blames)
    if (const Attribution* best = extreme(assembly, polarization, blame, -1.0))
      sentences.push_back(
          fmt::format("{} takes back {} that others bring: neutral alone, it would leave {} more.",
                      on_one_line(best->name), blame.words, with_unit(-*(best->value.*blame.figure), blame)));
  for (const analysis::CancellingPair& pair : polarization.cancelling)
    sentences.push_back(
        fmt::format("{} and {} cancel: they retard the chief ray by {:.2f} and {:.2f} deg, together "
                    "by {:.2f}; bettering one of them alone makes it worse.",
                    name_of(assembly, pair.first), name_of(assembly, pair.second), pair.first_deg,
                    pair.second_deg, pair.together_deg));
  return sentences;
}

std::vector<std::string> remedy_sentences(const Assembly& assembly, const Polarization& polarization) {
  std::vector<std::string> sentences;
  if (polarization.fold_turn)
    sentences.push_back(fold_sentence(assembly, *polarization.fold_turn));
  if (polarization.plates)
    sentences.push_back(plates_sentence(assembly, *polarization.plates));
  return sentences;
}

} // namespace lightledger::report
