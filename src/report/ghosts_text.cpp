#include "display_width.hpp"
#include "figures.hpp"
#include "prose.hpp"
#include "table.hpp"

#include <lightledger/report/ghosts.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <set>

namespace lightledger::report {
namespace {

using analysis::Ghost;
using analysis::Ghosts;

constexpr int number_width = 3;
/// Of all columns but that of the bounces, with the blanks between them.
constexpr int other_columns = 49;

/// A power that may be very small: `1.234e-07`; in dB where asked for.
std::string power(double value, const TextStyle& style) {
  if (style.decibels)
    return decibels(value);
  return value > 0.0 ? fmt::format("{:.3e}", value) : "-";
}

std::string relative(std::optional<double> value, const TextStyle& style) {
  return value ? power(*value, style) : "-";
}

std::string length(std::optional<double> value) {
  return value ? quantity(*value) : "-";
}

std::string names(const std::vector<std::string>& bounces, int width) {
  return shortened(on_one_line(fmt::format("{}", fmt::join(bounces, ", "))), width);
}

std::string paths_table(const Ghosts& ghosts, std::size_t rows, const TextStyle& style) {
  const int widest = style.width - other_columns;
  Table table({{"", Align::right, number_width},
               {"bounces at", Align::left},
               {"power"},
               {"relative"},
               {"rms mm"},
               {"excess mm"}});
  for (std::size_t i = 0; i < std::min(rows, ghosts.paths.size()); ++i) {
    const Ghost& ghost = ghosts.paths[i];
    table.add({std::to_string(i + 1), names(ghost.bounces, widest), Cell(power(ghost.power, style), i == 0),
               relative(ghost.relative_power, style), quantity(ghost.spot.rms_radius_mm),
               length(ghost.path_excess_mm)});
  }
  return table.text(style.emphasis);
}

std::string with_error(double value, std::optional<double> error, const TextStyle& style) {
  std::string text = power(value, style);
  if (error && !style.decibels)
    text += fmt::format(" +- {}", error_size(*error));
  return text;
}

std::string total_line(const Ghosts& ghosts, std::chrono::duration<double> elapsed, const TextStyle& style) {
  return fmt::format(
      "ghosts  {}    closes to {}    {} rays, {}\n", with_error(ghosts.total, ghosts.uncertainty, style),
      error_size(std::abs(ghosts.closure_error)), count(ghosts.rays), duration(elapsed.count()));
}

/// What is shown of the paths, and what all others bring.
std::string certainty(const Ghosts& ghosts, std::size_t shown) {
  double listed = 0.0;
  for (std::size_t i = 0; i < std::min(shown, ghosts.paths.size()); ++i)
    listed += ghosts.paths[i].power;
  const double rest = std::max(ghosts.total - listed, 0.0) + ghosts.not_followed;
  std::string sentence = fmt::format("Of {} paths of at most {} bounces, {} bring light. Within the train as "
                                     "written, for the rays sampled",
                                     count(ghosts.paths_considered), ghosts.bounces,
                                     count(ghosts.paths.size() + ghosts.unlisted_paths));
  if (ghosts.uncertainty)
    sentence += fmt::format(" (+- {})", error_size(*ghosts.uncertainty));
  sentence += fmt::format(", all ghosts not listed together bring less than {:.2g} of the launched power; "
                          "edges, mounts and scattered light are not followed.",
                          rest);
  return sentence;
}

std::string reflectance(double value) {
  return fmt::format("{:.2g} %", 100.0 * value);
}

/// "cover rear from 4.2 % to 1.1 %, or image from 6 % to 1.6 %", of those that alone would do.
std::vector<std::string> remedies(const Ghost& ghost) {
  std::vector<std::string> clauses;
  for (std::size_t i = 0; i < ghost.cure.size(); ++i)
    if (const analysis::GhostBounce& bounce = ghost.cure[i]; bounce.needed_reflectance)
      clauses.push_back(fmt::format("{} from {} to {}", on_one_line(ghost.bounces[i]),
                                    reflectance(bounce.reflectance),
                                    reflectance(*bounce.needed_reflectance)));
  return clauses;
}

std::string share_of_culprit(const Ghosts& ghosts) {
  const analysis::GhostCulprit& culprit = *ghosts.culprit;
  std::string sentence = fmt::format("{} takes part in {} of it", on_one_line(culprit.name),
                                     per_cent(culprit.power / ghosts.total));
  if (culprit.needed_reflectance)
    sentence += fmt::format(": from {} to {} there would do too", reflectance(*culprit.reflectance),
                            reflectance(*culprit.needed_reflectance));
  return sentence + ".";
}

/// What would keep the limit, or where half of the light comes from.
std::string advice(const Ghosts& ghosts) {
  if (ghosts.paths.empty() || !ghosts.culprit)
    return "";
  if (!ghosts.limit || ghosts.total <= *ghosts.limit)
    return fmt::format("Path 1 brings {} of it; {}", per_cent(ghosts.paths.front().power / ghosts.total),
                       share_of_culprit(ghosts));
  std::string sentence = fmt::format("That is {:.2g} more than the {} allowed. ",
                                     ghosts.total - *ghosts.limit, plain(*ghosts.limit));
  const std::vector<std::string> clauses = remedies(ghosts.paths.front());
  if (clauses.empty())
    sentence += "No cure of path 1 alone is enough. ";
  else
    sentence += fmt::format("Curing path 1 is enough: {}. ", fmt::join(clauses, ", or "));
  return sentence + share_of_culprit(ghosts);
}

std::string place(const analysis::HotFocus& focus) {
  if (focus.on)
    return "on " + on_one_line(*focus.on);
  return fmt::format("in {} after {}", on_one_line(*focus.medium), on_one_line(focus.from));
}

constexpr const char* caution = "Focused and returned beams can damage optics and blind: ask a laser safety "
                                "officer, and see IEC 60825-1.";

/// Where beams are brighter than what was launched; each place once.
std::string foci_table(const Ghosts& ghosts, const TextStyle& style) {
  constexpr std::size_t rows = 5;
  constexpr int figures = 33; ///< columns of all that is not a name
  const int widest = (style.width - figures) / 2;
  Table table({{"bounces at", Align::left}, {"focus", Align::left}, {"radius mm"}, {"irradiance ratio"}});
  std::set<std::string> places;
  for (const analysis::HotFocus& focus : ghosts.foci) {
    if (places.size() == rows || !places.insert(place(focus)).second)
      continue;
    table.add({focus.bounces.empty() ? "-" : names(focus.bounces, widest), shortened(place(focus), widest),
               quantity(focus.radius_mm), fmt::format("{:.2g}", focus.irradiance_ratio)});
  }
  return "\nFoci in or on glass and on surfaces, irradiance relative to the launched beam\n" +
         table.text(style.emphasis) + wrapped(caution, style.width);
}

std::string returned_table(const Ghosts& ghosts, std::size_t rows, const TextStyle& style) {
  std::string text =
      fmt::format("\nThrough the front returns {} of the launched power\n", power(ghosts.returned, style));
  Table table({{"", Align::right, number_width}, {"bounces at", Align::left}, {"power"}});
  for (std::size_t i = 0; i < std::min(rows, ghosts.returned_paths.size()); ++i) {
    const analysis::ReturnedPath& path = ghosts.returned_paths[i];
    table.add({std::to_string(i + 1), names(path.bounces, style.width - 20), power(path.power, style)});
  }
  return text + table.text(style.emphasis);
}

} // namespace

std::string ghosts_text(const assembly::Assembly& assembly, const Ghosts& ghosts,
                        const std::vector<std::string>& warnings, std::chrono::duration<double> elapsed,
                        const GhostsTextOptions& options, const TextStyle& style) {
  std::string text = heading(assembly, style.width);
  if (style.decibels)
    text += "Powers in dB\n";
  text += '\n';
  if (!ghosts.paths.empty())
    text += paths_table(ghosts, options.rows, style);
  text += total_line(ghosts, elapsed, style);
  text += '\n';
  if (const std::string sentence = advice(ghosts); !sentence.empty())
    text += wrapped(sentence, style.width);
  text += wrapped(certainty(ghosts, options.rows), style.width);
  if (!ghosts.foci.empty())
    text += foci_table(ghosts, style);
  if (options.returned)
    text += returned_table(ghosts, options.rows, style);
  if (!warnings.empty())
    text += '\n';
  text += describe_warnings(warnings, style.width);
  return text;
}

} // namespace lightledger::report
