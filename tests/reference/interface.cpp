#include "reference/boundary.hpp"
#include "reference/media.hpp"
#include "reference/shape.hpp"

#include <algorithm>
#include <cmath>
#include <stdexcept>
#include <utility>

namespace lightledger::reference {
namespace {

double thickness(const assembly::Assembly& assembly, const assembly::Film& film) {
  if (const double* written = std::get_if<double>(&film.thickness))
    return *written;
  const auto& waves = std::get<assembly::Film::Waves>(film.thickness);
  return waves.waves * waves.at_nm / index_of(assembly, film.medium, waves.at_nm).n;
}

/// The films in the order in which light from the `before` side meets them: of a stack that stands on the far
/// side the outermost, last written, comes first.
std::vector<Film> films_met(const assembly::Assembly& assembly, const assembly::Layers& layers,
                            assembly::Side substrate, double wavelength_nm) {
  std::vector<Film> films;
  for (const assembly::Film& film : layers.films)
    films.push_back({index_of(assembly, film.medium, wavelength_nm).complex(), thickness(assembly, film)});
  if (substrate == assembly::Side::beyond)
    std::reverse(films.begin(), films.end());
  return films;
}

/// Media in which rays go on count with their real index, opaque ones with n + iκ; nothing behind a coating
/// (a mirror without a backing) is more of the medium in front.
optics::Index exit_index(const assembly::Assembly& assembly, const assembly::Surface& surface,
                         double wavelength_nm) {
  const optics::Index index = index_of(assembly, surface.beyond.value_or(surface.before), wavelength_nm);
  return optics::opaque(index) ? index : optics::Index{index.n, 0.0};
}

/// Of the medium of the measurement: `from`, else the side opposite the substrate, else air.
double index_of_angles(const assembly::Assembly& assembly, const assembly::Surface& surface,
                       const assembly::Measured& coating, double wavelength_nm) {
  if (coating.from)
    return index_of(assembly, *coating.from, wavelength_nm).n;
  if (surface.coating->substrate == assembly::Side::beyond)
    return index_of(assembly, surface.before, wavelength_nm).n;
  return surface.beyond ? index_of(assembly, *surface.beyond, wavelength_nm).n : 1.0;
}

} // namespace

assembly::Surface seen_from(assembly::Side side, assembly::Surface surface) {
  if (side == assembly::Side::before)
    return surface;
  if (surface.beyond)
    std::swap(surface.before, *surface.beyond);
  if (surface.coating)
    surface.coating->substrate = surface.coating->substrate == assembly::Side::before
                                     ? assembly::Side::beyond
                                     : assembly::Side::before;
  return surface;
}

Interface interface_at(const assembly::Assembly& assembly, const assembly::Surface& surface, Incidence angle,
                       double wavelength_nm) {
  Interface here;
  here.incident = index_of(assembly, surface.before, wavelength_nm).n;
  here.exit = exit_index(assembly, surface, wavelength_nm);
  const bool transparent = !optics::opaque(here.exit);
  here.total_reflection =
      transparent && here.incident * angle.sine >= here.exit.n && here.incident > here.exit.n;
  here.doubtful = transparent && here.incident > here.exit.n &&
                  std::abs(std::atan2(angle.sine, angle.cosine) - std::asin(here.exit.n / here.incident)) <
                      doubtful_within;

  const Complex exit = here.exit.complex();
  if (!surface.coating) {
    here.boundary = bare(here.incident, exit, angle);
    return here;
  }
  const assembly::Coating& coating = assembly.coatings.at(surface.coating->coating);
  if (const auto* powers = std::get_if<assembly::Ideal>(&coating.kind))
    here.boundary = ideal(*powers, here.total_reflection);
  else if (const auto* curves = std::get_if<assembly::Measured>(&coating.kind))
    here.boundary =
        measured(*curves, {wavelength_nm, here.incident * angle.sine,
                           index_of_angles(assembly, surface, *curves, wavelength_nm),
                           surface.coating->substrate == assembly::Side::before, here.total_reflection});
  else
    here.boundary = stack(here.incident,
                          films_met(assembly, std::get<assembly::Layers>(coating.kind),
                                    surface.coating->substrate, wavelength_nm),
                          exit, angle, wavelength_nm);
  return here;
}

} // namespace lightledger::reference
