#include "reference/boundary.hpp"

#include <cmath>
#include <cstddef>
#include <numbers>

namespace lightledger::reference {
namespace {

enum class Polarization { s, p };

/// One medium of the stack as a wave of fixed tangential wave number sees it. The tangential fields of a wave
/// are E exp(±i k q z) and H = ± admittance · E.
struct Medium {
  Complex permittivity, q, admittance;
  double thickness; ///< times the vacuum wave number k
};

Medium medium(Complex index, double tangential, double thickness, Polarization polarization) {
  const Complex permittivity = index * index;
  Complex q = std::sqrt(permittivity - tangential * tangential);
  if (q.imag() < 0.0)
    q = -q;
  return {permittivity, q, polarization == Polarization::s ? q : permittivity / q, thickness};
}

/// The face between two media, met from the first: tangential fields, relative to the arriving one.
Complex face_reflection(const Medium& from, const Medium& to) {
  return (from.admittance - to.admittance) / (from.admittance + to.admittance);
}
Complex face_transmission(const Medium& from, const Medium& to) {
  return 2.0 * from.admittance / (from.admittance + to.admittance);
}

Complex once_through(const Medium& film) {
  return std::exp(Complex{0.0, 1.0} * film.q * film.thickness);
}

/// ∫|a exp(i q z) + b exp(i q (d − z))|² dz over a film, z and d times k.
double intensity_over_depth(const Medium& film, Complex at_top, Complex at_bottom) {
  const double turns = film.q.real() * film.thickness;
  const double decay = film.q.imag() * film.thickness;
  const double mean_of_each = decay > 0.0 ? -std::expm1(-2.0 * decay) / (2.0 * decay) : 1.0;
  const double mean_of_both = std::exp(-decay) * (turns > 0.0 ? std::sin(turns) / turns : 1.0);
  return film.thickness * ((std::norm(at_top) + std::norm(at_bottom)) * mean_of_each +
                           2.0 * (at_top * std::conj(at_bottom)).real() * mean_of_both);
}

/// The flux that a film takes from waves that start with tangential amplitudes a at its top and b at its
/// bottom: ∫ Im ε |E|² dz, where the field of p has a normal part too, of size |tangential wave number ·
/// H/ε|.
double loss_in(const Medium& film, Complex a, Complex b, double tangential, Polarization polarization) {
  if (film.permittivity.imag() == 0.0)
    return 0.0;
  double intensity = intensity_over_depth(film, a, b);
  if (polarization == Polarization::p)
    intensity += tangential * tangential / std::norm(film.q) * intensity_over_depth(film, a, -b);
  return film.permittivity.imag() * intensity;
}

/// Reflectances looking into the stack from above each face, the last face first in the making.
std::vector<Complex> reflections(const std::vector<Medium>& media) {
  const std::size_t last = media.size() - 2;
  std::vector<Complex> seen(media.size() - 1);
  seen[last] = face_reflection(media[last], media[last + 1]);
  for (std::size_t face = last; face-- > 0;) {
    const Complex through = once_through(media[face + 1]);
    const Complex returned = seen[face + 1] * through * through;
    const Complex r = face_reflection(media[face], media[face + 1]);
    seen[face] = (r + returned) / (1.0 + r * returned);
  }
  return seen;
}

Channel channel(const std::vector<Medium>& media, double tangential, Polarization polarization) {
  const std::vector<Complex> seen = reflections(media);
  const double arriving_flux = media.front().admittance.real();
  Complex forward = 1.0; // at the bottom of each medium in turn
  double absorbed = 0.0;
  for (std::size_t face = 0; face + 1 < seen.size(); ++face) {
    const Medium& film = media[face + 1];
    const Complex through = once_through(film);
    const Complex r = face_reflection(media[face], film);
    const Complex top =
        forward * face_transmission(media[face], film) / (1.0 + r * seen[face + 1] * through * through);
    forward = top * through;
    absorbed += loss_in(film, top, seen[face + 1] * forward, tangential, polarization);
  }
  const Medium& exit = media.back();
  const Complex t = forward * face_transmission(media[media.size() - 2], exit);
  const double flux = exit.admittance.real() / arriving_flux;
  const double sign =
      polarization == Polarization::s ? 1.0 : -1.0; // contract §2: r_p = −r_s at normal incidence
  return {sign * seen.front(), t * std::sqrt(flux), std::norm(seen.front()), std::norm(t) * flux,
          absorbed / arriving_flux};
}

} // namespace

Boundary stack(double incident, const std::vector<Film>& films, Complex exit, Incidence angle,
               double wavelength_nm) {
  const double tangential = incident * angle.sine;
  const auto of = [&](Polarization polarization) {
    Medium entrance = medium(incident, tangential, 0.0, polarization);
    entrance.q = incident * angle.cosine;
    entrance.admittance = polarization == Polarization::s ? entrance.q : incident / angle.cosine;
    std::vector<Medium> media{entrance};
    for (const Film& film : films)
      media.push_back(medium(film.index, tangential,
                             2.0 * std::numbers::pi * film.thickness_nm / wavelength_nm, polarization));
    media.push_back(medium(exit, tangential, 0.0, polarization));
    return channel(media, tangential, polarization);
  };
  return {of(Polarization::s), of(Polarization::p)};
}

} // namespace lightledger::reference
