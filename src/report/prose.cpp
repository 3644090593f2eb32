#include "prose.hpp"

#include "display_width.hpp"
#include "figures.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numbers>

namespace lightledger::report {
namespace {

constexpr double degrees = 180.0 / std::numbers::pi;
/// Below this a Stokes parameter, or a lack of polarization, is rounding.
constexpr double negligible = 1e-9;

std::string describe_wavelengths(const std::vector<assembly::Wavelength>& wavelengths) {
  if (wavelengths.size() == 1)
    return plain(wavelengths.front().nm) + " nm";
  const auto [shortest, longest] = std::ranges::minmax(wavelengths, {}, &assembly::Wavelength::nm);
  return fmt::format("{} wavelengths {} to {} nm", wavelengths.size(), plain(shortest.nm), plain(longest.nm));
}

std::string fully_polarized(double s1, double s2, double s3) {
  const double azimuth = std::abs(std::hypot(s1, s2)) < negligible ? 0.0 : 0.5 * degrees * std::atan2(s2, s1);
  const double ellipticity = 0.5 * degrees * std::asin(std::clamp(s3, -1.0, 1.0));
  const char* hand = s3 > 0.0 ? "right" : "left";
  if (std::abs(s3) < negligible)
    return fmt::format("linear {} deg", plain(azimuth + 0.0));
  if (std::hypot(s1, s2) < negligible)
    return fmt::format("circular {} (IEEE)", hand);
  return fmt::format("elliptical {} (IEEE), azimuth {} deg, ellipticity {} deg", hand, plain(azimuth),
                     plain(ellipticity));
}

} // namespace

std::string wrapped(std::string_view sentence, int width) {
  constexpr std::string_view indent = "  ";
  std::string lines;
  int column = 0;
  while (!sentence.empty()) {
    const std::string_view word = sentence.substr(0, sentence.find(' '));
    sentence.remove_prefix(std::min(word.size() + 1, sentence.size()));
    const bool first = column == 0;
    const bool fits = column + 1 + display_width(word) <= width;
    const std::string_view before = first ? "" : fits ? " " : indent;
    if (!first && !fits) {
      lines += '\n';
      column = 0;
    }
    lines.append(before).append(word);
    column += static_cast<int>(before.size()) + display_width(word);
  }
  lines += '\n';
  return lines;
}

std::string describe_polarization(const optics::State& state) {
  const double degree = std::hypot(state.s1, state.s2, state.s3);
  if (degree < negligible)
    return "unpolarized";
  std::string words = fully_polarized(state.s1 / degree, state.s2 / degree, state.s3 / degree);
  if (degree < 1.0 - negligible)
    words += fmt::format(", {} polarized", per_cent(degree));
  return words;
}

std::string describe_light(const assembly::Light& light) {
  std::string words =
      describe_wavelengths(light.wavelengths) + ", " + describe_polarization(light.polarization);
  if (light.fields.size() > 1)
    words += fmt::format(", {} fields", light.fields.size());
  return words;
}

std::string heading(const assembly::Assembly& assembly, int width) {
  const std::string title = on_one_line(assembly.title);
  const std::string light = describe_light(assembly.light);
  if (title.empty())
    return wrapped(light, width);
  if (display_width(title) + 4 + display_width(light) <= width)
    return title + "    " + light + '\n';
  return wrapped(title, width) + wrapped(light, width);
}

std::string describe_warnings(const std::vector<std::string>& warnings, int width) {
  std::string lines;
  for (const std::string& warning : warnings)
    lines += wrapped("Warning: " + on_one_line(warning), width);
  return lines;
}

} // namespace lightledger::report
