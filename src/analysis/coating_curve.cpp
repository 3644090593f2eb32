#include "known_media.hpp"

#include <lightledger/analysis/coating_curve.hpp>
#include <lightledger/assembly/films.hpp>
#include <lightledger/optics/boundary.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <utility>

namespace lightledger::analysis {
namespace {

using assembly::Assembly;
using assembly::Coating;
using assembly::Fault;
using assembly::Side;
using optics::Complex;
using optics::Index;
using optics::Medium;

/// Everything a row needs, found and checked.
struct Setting {
  const Assembly& assembly;
  const Coating* coating; ///< null for the bare boundary
  Medium incident, substrate;
};

const Coating* find_coating(const Assembly& assembly, std::string_view name) {
  const auto found = std::ranges::find(assembly.coatings, name, &Coating::name);
  return found == assembly.coatings.end() ? nullptr : &*found;
}

Fault unknown_coating(const Assembly& assembly, std::string_view name) {
  std::vector<std::string_view> names{bare};
  for (const Coating& coating : assembly.coatings)
    names.emplace_back(coating.name);
  return {{},
          fmt::format("the file has no coating '{}'", name),
          fmt::format("{}", fmt::join(names, ", ")),
          std::string(assembly::nearest(name, names))};
}

/// Without a coating the substrate is the side that is no gas; where both or neither is, the side beyond.
Side bare_substrate(const Assembly& assembly, const assembly::Surface& surface) {
  const double wavelength = assembly.light.wavelengths.front().nm;
  const auto is_gas = [&](assembly::MediumId id) {
    const std::optional<Index> index = optics::index_at(assembly.media[id], wavelength);
    return index && optics::gas(*index);
  };
  return is_gas(*surface.beyond) && !is_gas(surface.before) ? Side::before : Side::beyond;
}

/// The side of this surface that the coating, null for none, stands on; nothing where it is not used.
std::optional<Side> substrate_side(const Assembly& assembly, const assembly::Surface& surface,
                                   const Coating* coating) {
  if (!std::holds_alternative<assembly::Interface>(surface.effect) || !surface.beyond)
    return std::nullopt;
  if (!coating)
    return surface.coating ? std::nullopt : std::optional(bare_substrate(assembly, surface));
  if (!surface.coating || &assembly.coatings[surface.coating->coating] != coating)
    return std::nullopt;
  return surface.coating->substrate;
}

/// The substrate at the first station that uses the coating.
std::optional<Medium> substrate_in_train(const Assembly& assembly, const Coating* coating) {
  for (const assembly::Station& station : assembly.stations) {
    const assembly::Surface& surface = assembly.surfaces[station.surface];
    if (const std::optional<Side> side = substrate_side(assembly, surface, coating))
      return assembly.media[*side == Side::before ? surface.before : *surface.beyond];
  }
  return std::nullopt;
}

std::optional<Medium> named_medium(const Assembly& assembly, const std::string& name,
                                   assembly::Faults& faults) {
  std::optional<Medium> medium = find_medium(assembly, name);
  if (!medium)
    faults.add(unknown_medium(name, medium_names(assembly)));
  return medium;
}

std::optional<Medium> substrate_of(const Assembly& assembly, const Coating* coating,
                                   const CoatingRequest& request, assembly::Faults& faults) {
  if (request.substrate)
    return named_medium(assembly, *request.substrate, faults);
  std::optional<Medium> medium = substrate_in_train(assembly, coating);
  if (!medium)
    faults.add({{},
                coating ? fmt::format("no station uses the coating '{}', so its substrate must be told",
                                      request.name)
                        : std::string("no station has a bare boundary, so a substrate must be told"),
                "--substrate MEDIUM",
                {}});
  return medium;
}

std::optional<Setting> setting_of(const Assembly& assembly, const CoatingRequest& request,
                                  assembly::Faults& faults) {
  const Coating* coating = find_coating(assembly, request.name);
  if (!coating && request.name != bare) {
    faults.add(unknown_coating(assembly, request.name));
    return std::nullopt;
  }
  std::optional<Medium> incident = named_medium(assembly, request.incident, faults);
  std::optional<Medium> substrate = substrate_of(assembly, coating, request, faults);
  if (!incident || !substrate)
    return std::nullopt;
  return Setting{assembly, coating, std::move(*incident), std::move(*substrate)};
}

std::vector<Medium> media_of(const Setting& setting) {
  std::vector<Medium> media{setting.incident, setting.substrate};
  const auto* layers = setting.coating ? std::get_if<assembly::Layers>(&setting.coating->kind) : nullptr;
  if (!layers)
    return media;
  std::vector<assembly::MediumId> ids;
  for (const assembly::Film& film : layers->films)
    ids.push_back(film.medium);
  std::ranges::sort(ids);
  ids.erase(std::ranges::unique(ids).begin(), ids.end());
  for (const assembly::MediumId id : ids)
    media.push_back(setting.assembly.media[id]);
  return media;
}

void check_media(const Setting& setting, const std::vector<double>& wavelengths_nm,
                 assembly::Faults& faults) {
  std::vector<std::string> told;
  for (const Medium& medium : media_of(setting)) {
    std::optional<Fault> fault = outside_range(medium, wavelengths_nm);
    if (!fault || std::ranges::find(told, medium.name) != told.end())
      continue;
    told.push_back(medium.name);
    faults.add(std::move(*fault));
  }
  if (!faults.none())
    return;
  for (const double wavelength : wavelengths_nm)
    if (const Index index = *optics::index_at(setting.incident, wavelength); optics::opaque(index)) {
      faults.add({{},
                  fmt::format("{} is opaque at {} nm (kappa {:.3g}): no light arrives through it",
                              setting.incident.name, wavelength, index.kappa),
                  "a transparent medium for --incident",
                  {}});
      return;
    }
}

void check_ranges(const CoatingRequest& request, assembly::Faults& faults) {
  const auto outside = [](double angle) { return !(angle >= 0.0 && angle <= 90.0); };
  const auto angle = std::ranges::find_if(request.angles_deg, outside);
  if (angle != request.angles_deg.end())
    faults.add(
        {{}, fmt::format("{} deg is no angle of incidence", *angle), "angles from 0 to 90 degrees", {}});
}

/// Degrees in (−180, 180]; a phase that rounding left just above −180 is 180.
double phase_deg(Complex amplitude) {
  constexpr double rounding = 1e-10;
  const double phase = std::arg(amplitude) * (180.0 / std::numbers::pi);
  return phase <= -180.0 + rounding ? 180.0 : phase + 0.0;
}

/// A reflected amplitude below this is what rounding leaves of none.
constexpr double no_reflection = 1e-15;

CoatingComponent component(Complex r, Complex t, double absorptance, bool opaque) {
  CoatingComponent result{std::norm(r), std::norm(t), absorptance, {}, {}};
  if (std::abs(r) > no_reflection)
    result.phase_r_deg = phase_deg(r);
  if (t != 0.0 && !opaque)
    result.phase_t_deg = phase_deg(t);
  return result;
}

/// r_s = −√R, r_p = +√R, t = √T at every angle; beyond the critical angle what is not absorbed is reflected.
CoatingComponent ideal_component(const assembly::Ideal::Powers& powers, double sign, bool total,
                                 bool opaque) {
  const double absorptance = std::max(0.0, 1.0 - powers.reflect - powers.transmit);
  const double reflectance = total ? 1.0 - absorptance : powers.reflect;
  const double transmittance = total ? 0.0 : powers.transmit;
  CoatingComponent result =
      component(sign * std::sqrt(reflectance), std::sqrt(transmittance), absorptance, opaque);
  result.reflectance = reflectance;
  result.transmittance = transmittance;
  return result;
}

/// The coating at one wavelength, met at any angle.
class Monochromatic {
public:
  Monochromatic(const Setting& setting, double wavelength_nm)
      : m_coating(setting.coating), m_wavelength_nm(wavelength_nm),
        m_incident(optics::index_at(setting.incident, wavelength_nm)->n) {
    const Index substrate = *optics::index_at(setting.substrate, wavelength_nm);
    m_opaque = optics::opaque(substrate);
    m_substrate = m_opaque ? substrate.complex() : Complex(substrate.n);
    const auto* layers = m_coating ? std::get_if<assembly::Layers>(&m_coating->kind) : nullptr;
    if (layers) {
      m_layers = assembly::optical_layers(setting.assembly, *layers, wavelength_nm);
      std::ranges::reverse(m_layers);
    }
  }

  [[nodiscard]] CoatingRow row(double angle_deg) const {
    const double cosine = std::cos(angle_deg * (std::numbers::pi / 180.0));
    CoatingRow row{m_wavelength_nm, angle_deg, {}, {}};
    if (const auto* ideal = m_coating ? std::get_if<assembly::Ideal>(&m_coating->kind) : nullptr) {
      const bool total = optics::normal_component(m_incident, m_substrate, cosine).real() == 0.0;
      row.s = ideal_component(ideal->s, -1.0, total, m_opaque);
      row.p = ideal_component(ideal->p, 1.0, total, m_opaque);
      return row;
    }
    const optics::Response response = respond(cosine);
    row.s = component(response.r_s, response.t_s, response.absorptance_s, m_opaque);
    row.p = component(response.r_p, response.t_p, response.absorptance_p, m_opaque);
    return row;
  }

private:
  [[nodiscard]] optics::Response respond(double cosine) const {
    return m_layers.empty()
               ? optics::bare_boundary(m_incident, m_substrate, cosine)
               : optics::layered_boundary(m_incident, m_layers, m_substrate, cosine, m_wavelength_nm);
  }

  const Coating* m_coating;
  double m_wavelength_nm;
  double m_incident;
  Complex m_substrate;
  bool m_opaque;
  std::vector<optics::Layer> m_layers; ///< in the order in which the light meets them
};

std::vector<double> wavelengths_of(const Assembly& assembly, const CoatingRequest& request) {
  if (!request.wavelengths_nm.empty())
    return request.wavelengths_nm;
  std::vector<double> wavelengths;
  for (const assembly::Wavelength& wavelength : assembly.light.wavelengths)
    wavelengths.push_back(wavelength.nm);
  return wavelengths;
}

} // namespace

CoatingCurveResult coating_curve(const Assembly& assembly, const CoatingRequest& request) {
  CoatingCurveResult result;
  check_ranges(request, result.faults);
  const std::optional<Setting> setting = setting_of(assembly, request, result.faults);
  if (!setting || !result.faults.none())
    return result;
  const std::vector<double> wavelengths = wavelengths_of(assembly, request);
  check_media(*setting, wavelengths, result.faults);
  if (!result.faults.none())
    return result;

  CoatingCurve curve{request.name, setting->incident.name, setting->substrate.name, {}};
  for (const double wavelength : wavelengths) {
    const Monochromatic coating(*setting, wavelength);
    for (const double angle : request.angles_deg)
      curve.rows.push_back(coating.row(angle));
  }
  result.curve = std::move(curve);
  return result;
}

} // namespace lightledger::analysis
