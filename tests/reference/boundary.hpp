#pragma once

#include <lightledger/assembly/assembly.hpp>

#include <complex>
#include <vector>

namespace lightledger::reference {

using Complex = std::complex<double>;

/// What a boundary does to one polarization: flux-normalised amplitudes, and fractions of the power that come
/// each from an expression of its own. `transmitted` enters the medium behind, also where that is opaque and
/// t means nothing.
struct Channel {
  Complex r, t;
  double reflected, transmitted, absorbed;
};

struct Boundary {
  Channel s, p;
};

/// A film of a stack.
struct Film {
  Complex index;
  double thickness_nm;
};

/// An angle of incidence by its cosine and sine, each accurate where the other is not.
struct Incidence {
  double cosine, sine;
};

/// Fresnel (1823) in the angle of incidence alone, from a lossless medium into any other (contract §2).
[[nodiscard]] Boundary bare(double incident, Complex exit, Incidence angle);

/// A stack of films, listed as the light meets them, by the reflectances of its faces taken together from the
/// last to the first (Airy 1833, Rouard 1937; Born & Wolf, 7th ed., §1.6.4 with §7.6.1): no growing
/// exponential appears. What the films absorb is the integral of their loss over depth.
[[nodiscard]] Boundary stack(double incident, const std::vector<Film>& films, Complex exit, Incidence angle,
                             double wavelength_nm);

/// An ideal coating; beyond the critical angle it reflects all that it does not absorb.
[[nodiscard]] Boundary ideal(const assembly::Ideal& coating, bool total_reflection);

/// Where light meets a measured coating.
struct MeasuredAt {
  double wavelength_nm;
  double sine_in_air;    ///< n sinθ, the same in all media
  double index;          ///< of the medium that the file's angles are in
  bool from_behind;      ///< not from the side that the light of the measurement came from
  bool total_reflection; ///< then all that it does not absorb is reflected
};

/// A measured coating, bilinear in wavelength and angle; beyond the last of either that one holds. From
/// behind, reflected phases are those of Stokes' reversal, π + 2 φ_t − φ_r, where phases were measured.
[[nodiscard]] Boundary measured(const assembly::Measured& coating, const MeasuredAt& at);

/// A surface as light from one of its sides sees it: what lies there comes before it.
[[nodiscard]] assembly::Surface seen_from(assembly::Side side, assembly::Surface surface);

/// Everything about an interface of the assembly that a ray meets from its `before` side.
struct Interface {
  double incident;    ///< real index of the medium of incidence
  optics::Index exit; ///< of the medium behind; real where it is transparent
  Boundary boundary;
  bool total_reflection;
  bool doubtful; ///< within 1e-9 of the critical angle
};
[[nodiscard]] Interface interface_at(const assembly::Assembly& assembly, const assembly::Surface& surface,
                                     Incidence angle, double wavelength_nm);

} // namespace lightledger::reference
