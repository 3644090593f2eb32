#include "coating_setting.hpp"

#include <lightledger/analysis/coating_curve.hpp>
#include <lightledger/assembly/films.hpp>
#include <lightledger/optics/boundary.hpp>
#include <lightledger/trace/curve.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <utility>

namespace lightledger::analysis {
namespace {

using assembly::Ideal;
using optics::Complex;

/// Degrees in (−180, 180]; a phase that rounding left just above −180 is 180.
double phase_deg(Complex amplitude) {
  constexpr double rounding = 1e-10;
  const double phase = std::arg(amplitude) * (180.0 / std::numbers::pi);
  return phase <= -180.0 + rounding ? 180.0 : phase + 0.0;
}

CoatingComponent component(Complex r, Complex t, double absorptance, bool opaque) {
  constexpr double no_reflection = 1e-15; // what rounding leaves of no amplitude at all
  CoatingComponent result{std::norm(r), std::norm(t), absorptance, {}, {}};
  if (std::abs(r) > no_reflection)
    result.phase_r_deg = phase_deg(r);
  if (t != 0.0 && !opaque)
    result.phase_t_deg = phase_deg(t);
  return result;
}

/// r_s = −√R, r_p = +√R, t = √T at every angle; `total`: beyond the critical angle, where all is reflected
/// that is not absorbed.
CoatingComponent ideal_component(const Ideal::Powers& powers, double sign, bool total, bool opaque) {
  const double absorptance = std::max(0.0, 1.0 - powers.reflect - powers.transmit);
  const double reflect = total ? 1.0 - absorptance : powers.reflect;
  const double transmit = total ? 0.0 : powers.transmit;
  CoatingComponent result = component(sign * std::sqrt(reflect), std::sqrt(transmit), absorptance, opaque);
  result.reflectance = reflect;
  result.transmittance = transmit;
  return result;
}

/// Measured powers from the front, with phases where the file has them.
CoatingComponent measured_component(double reflect, double transmit, double phase_r, double phase_t,
                                    bool phases, bool total, bool opaque) {
  const double absorptance = std::max(0.0, 1.0 - reflect - transmit);
  const double reflected = total ? 1.0 - absorptance : reflect;
  const double transmitted = total ? 0.0 : transmit;
  CoatingComponent result = component(std::polar(std::sqrt(reflected), phase_r),
                                      std::polar(std::sqrt(transmitted), phase_t), absorptance, opaque);
  result.reflectance = reflected;
  result.transmittance = transmitted;
  if (!phases)
    result.phase_r_deg = result.phase_t_deg = std::nullopt;
  return result;
}

/// The coating at one wavelength, met at any angle.
class Monochromatic {
public:
  Monochromatic(const assembly::Assembly& assembly, const CoatingSetting& setting, double wavelength_nm)
      : m_wavelength_nm(wavelength_nm), m_incident(optics::index_at(setting.incident, wavelength_nm)->n),
        m_ideal(setting.ideal()), m_measured(setting.measured()) {
    const optics::Index substrate = *optics::index_at(setting.substrate, wavelength_nm);
    m_opaque = optics::opaque(substrate);
    m_substrate = m_opaque ? substrate.complex() : Complex(substrate.n);
    if (setting.layers())
      m_layers = assembly::optical_layers(assembly, *setting.layers(), wavelength_nm);
    std::ranges::reverse(m_layers);
    if (m_measured) {
      m_curve = trace::curve(*m_measured, wavelength_nm, false);
      m_measured_in = m_measured->from ? optics::index_at(assembly.media[*m_measured->from], wavelength_nm)->n
                                       : m_incident;
    }
  }

  [[nodiscard]] CoatingRow row(double angle_deg) const {
    const double cosine = std::cos(angle_deg * (std::numbers::pi / 180.0));
    const bool total = optics::normal_component(m_incident, m_substrate, cosine).real() == 0.0;
    if (m_measured)
      return measured_row(angle_deg, total);
    if (m_ideal) {
      return {m_wavelength_nm, angle_deg, ideal_component(m_ideal->s, -1.0, total, m_opaque),
              ideal_component(m_ideal->p, 1.0, total, m_opaque)};
    }
    const optics::Response response = respond(cosine);
    return {m_wavelength_nm, angle_deg,
            component(response.r_s, response.t_s, response.absorptance_s, m_opaque),
            component(response.r_p, response.t_p, response.absorptance_p, m_opaque)};
  }

private:
  [[nodiscard]] CoatingRow measured_row(double angle_deg, bool total) const {
    const double alpha = m_incident * std::sin(angle_deg * (std::numbers::pi / 180.0));
    const double x =
        m_measured->shift_index
            ? trace::wavelength_on_curve(alpha * alpha, *m_measured->shift_index, m_wavelength_nm)
            : trace::angle_on_curve(alpha * alpha, m_measured_in);
    const trace::CurvePoint at = trace::interpolate(m_curve, x);
    const bool phases = m_measured->has_phases;
    return {
        m_wavelength_nm, angle_deg,
        measured_component(at.reflect_s, at.transmit_s, at.phase_rs, at.phase_ts, phases, total, m_opaque),
        measured_component(at.reflect_p, at.transmit_p, at.phase_rp, at.phase_tp, phases, total, m_opaque)};
  }

  [[nodiscard]] optics::Response respond(double cosine) const {
    return m_layers.empty()
               ? optics::bare_boundary(m_incident, m_substrate, cosine)
               : optics::layered_boundary(m_incident, m_layers, m_substrate, cosine, m_wavelength_nm);
  }

  double m_wavelength_nm;
  double m_incident;
  Complex m_substrate;
  bool m_opaque;
  const Ideal* m_ideal;
  const assembly::Measured* m_measured;
  std::vector<trace::CurvePoint> m_curve;
  double m_measured_in = 1.0;          ///< index of the medium that the measured angles are in
  std::vector<optics::Layer> m_layers; ///< in the order in which the light meets them
};

void check_request(const CoatingRequest& request, std::size_t wavelengths, assembly::Faults& faults) {
  constexpr std::size_t most_rows = 1'000'000;
  const auto outside = [](double angle) { return !(angle >= 0.0 && angle <= 90.0); };
  const auto angle = std::ranges::find_if(request.angles_deg, outside);
  if (angle != request.angles_deg.end())
    faults.add(
        {{}, fmt::format("{} deg is no angle of incidence", *angle), "--angles from 0 to 90 degrees", {}});
  if (wavelengths * request.angles_deg.size() > most_rows)
    faults.add(
        {{},
         fmt::format("{} wavelengths and {} angles are too many", wavelengths, request.angles_deg.size()),
         "a million rows at most",
         {}});
}

} // namespace

CoatingCurveResult coating_curve(const assembly::Assembly& assembly, const CoatingRequest& request) {
  CoatingCurveResult result;
  const std::optional<CoatingSetting> setting = coating_setting(assembly, request, result.faults);
  check_request(request, setting ? setting->wavelengths_nm.size() : 0, result.faults);
  if (!setting || !result.faults.none())
    return result;

  CoatingCurve curve{request.name, setting->incident.name, setting->substrate.name, {}};
  for (const double wavelength : setting->wavelengths_nm) {
    const Monochromatic coating(assembly, *setting, wavelength);
    for (const double angle : request.angles_deg)
      curve.rows.push_back(coating.row(angle));
  }
  result.curve = std::move(curve);
  return result;
}

} // namespace lightledger::analysis
