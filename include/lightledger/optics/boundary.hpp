#pragma once

#include <lightledger/optics/index.hpp>

#include <span>

namespace lightledger::optics {

/// What a boundary between two media does to a plane wave that arrives at one angle.
///
/// Amplitudes are flux-normalised: |t|² is the fraction of the power that crosses (into an opaque medium:
/// enters) and |r|² the fraction reflected; signs and phases are those of contract §2 (r_p = −r_s at normal
/// incidence). The absorptances are what the layers between the media keep; they come from an expression of
/// their own and are exactly 0 where no layer absorbs.
struct Response {
  Complex r_s, r_p, t_s, t_p;
  double absorptance_s = 0.0;
  double absorptance_p = 0.0;
};

/// One homogeneous layer of a coating; thickness in nm.
struct Layer {
  Complex index;
  double thickness_nm;
};

/// n cosθ in a medium of index `exit`, for light that arrives from a lossless medium of index `incident` at
/// `cos_incident`: √(n2² − n1² sin²θ1), the root with Im ≥ 0, and ≥ 0 where real.
[[nodiscard]] Complex normal_component(double incident, Complex exit, double cos_incident);

/// The bare boundary: Fresnel (1823) amplitudes from a lossless medium into any other, total reflection
/// included. `cos_incident` lies in [0, 1]. Numerators are written as products, so that nothing cancels near
/// equal indices, Brewster's angle or grazing incidence. Absorptances are 0.
[[nodiscard]] Response bare_boundary(double incident, Complex exit, double cos_incident);

/// A stack of layers between two media, listed in the order in which the light meets them, by characteristic
/// matrices (Abelès 1950; Born & Wolf, Principles of Optics, 7th ed., §1.6.2). Fields are carried from the
/// exit to the entrance and rescaled, so that thick or strongly absorbing layers and long stacks neither
/// overflow nor give NaN; a transmittance may underflow to 0. Phases: r at the outermost surface, t from
/// there to the exit.
[[nodiscard]] Response layered_boundary(double incident, std::span<const Layer> layers, Complex exit,
                                        double cos_incident, double wavelength_nm);

} // namespace lightledger::optics
