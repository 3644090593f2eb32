#include "coating_setting.hpp"

#include "known_media.hpp"

#include <lightledger/assembly/films.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <utility>

namespace lightledger::analysis {
namespace {

using assembly::Assembly;
using assembly::Coating;
using assembly::Fault;
using assembly::Faults;
using assembly::Side;
using optics::Medium;

Fault unknown_coating(const Assembly& assembly, std::string_view name) {
  std::vector<std::string_view> names{bare};
  for (const Coating& coating : assembly.coatings)
    names.emplace_back(coating.name);
  return {{},
          fmt::format("the file has no coating '{}'", name),
          fmt::format("{}", fmt::join(names, ", ")),
          std::string(assembly::nearest(name, names))};
}

std::vector<std::string_view> medium_names(const Assembly& assembly) {
  std::vector<std::string_view> names = optics::builtin_media();
  for (const Medium& medium : assembly.media)
    names.emplace_back(medium.name);
  return names;
}

std::optional<Medium> named_medium(const Assembly& assembly, const std::string& name, const char* option,
                                   Faults& faults) {
  std::optional<Medium> medium = assembly::medium_named(assembly, name);
  if (!medium) {
    Fault fault = unknown_medium(name, medium_names(assembly));
    fault.message += fmt::format(" for {}", option);
    fault.accepted += ", or a medium of the file";
    faults.add(std::move(fault));
  }
  return medium;
}

/// Without a coating the substrate is the side that is no gas; where both or neither is, the side beyond.
Side bare_substrate(const Assembly& assembly, const assembly::Surface& surface) {
  const double wavelength = assembly.light.wavelengths.front().nm;
  const auto is_gas = [&](assembly::MediumId id) {
    const std::optional<optics::Index> index = optics::index_at(assembly.media[id], wavelength);
    return index && optics::gas(*index);
  };
  return is_gas(*surface.beyond) && !is_gas(surface.before) ? Side::before : Side::beyond;
}

/// The side of a surface that the coating, null for none, stands on; nothing where it is not used there.
std::optional<Side> substrate_side(const Assembly& assembly, const assembly::Surface& surface,
                                   const Coating* coating) {
  if (!std::holds_alternative<assembly::Interface>(surface.effect))
    return std::nullopt;
  if (!coating)
    return surface.coating || !surface.beyond ? std::nullopt
                                              : std::optional(bare_substrate(assembly, surface));
  if (!surface.coating || &assembly.coatings[surface.coating->coating] != coating)
    return std::nullopt;
  return surface.coating->substrate;
}

/// The medium on that side, where there is one.
std::optional<Medium> substrate_at(const Assembly& assembly, const assembly::Surface& surface,
                                   const Coating* coating) {
  const std::optional<Side> side = substrate_side(assembly, surface, coating);
  if (side == Side::before)
    return assembly.media[surface.before];
  return side && surface.beyond ? std::optional(assembly.media[*surface.beyond]) : std::nullopt;
}

/// The substrate at the first station that uses the coating, there or on its rear face, and has a medium
/// there.
std::optional<Medium> substrate_in_train(const Assembly& assembly, const Coating* coating) {
  for (const assembly::Station& station : assembly.stations) {
    const assembly::Surface& surface = assembly.surfaces[station.surface];
    if (auto medium = substrate_at(assembly, surface, coating))
      return medium;
    if (!surface.rear)
      continue;
    if (auto medium = substrate_at(assembly, assembly.surfaces[surface.rear->surface], coating))
      return medium;
  }
  return std::nullopt;
}

Fault substrate_untold(const CoatingRequest& request) {
  std::string message = request.name == bare
                            ? "no station has a bare boundary, so its substrate must be told"
                            : fmt::format("no station tells the substrate of '{}'", request.name);
  return {{}, std::move(message), "--substrate MEDIUM", {}};
}

std::optional<Medium> substrate_of(const Assembly& assembly, const Coating* coating,
                                   const CoatingRequest& request, Faults& faults) {
  if (request.substrate)
    return named_medium(assembly, *request.substrate, "--substrate", faults);
  std::optional<Medium> medium = substrate_in_train(assembly, coating);
  if (!medium)
    faults.add(substrate_untold(request));
  return medium;
}

std::vector<double> wavelengths_of(const Assembly& assembly, const CoatingRequest& request) {
  if (!request.wavelengths_nm.empty())
    return request.wavelengths_nm;
  std::vector<double> wavelengths;
  for (const assembly::Wavelength& wavelength : assembly.light.wavelengths)
    wavelengths.push_back(wavelength.nm);
  return wavelengths;
}

void check_incident(const CoatingSetting& setting, Faults& faults) {
  if (auto fault = outside_range(setting.incident, setting.wavelengths_nm)) {
    faults.add(std::move(*fault));
    return;
  }
  for (const double wavelength : setting.wavelengths_nm) {
    const optics::Index index = *optics::index_at(setting.incident, wavelength);
    if (!optics::opaque(index))
      continue;
    faults.add({{},
                fmt::format("{} is opaque at {} nm (kappa {:.3g}): no light arrives through it",
                            setting.incident.name, wavelength, index.kappa),
                "a transparent medium for --incident",
                {}});
    return;
  }
}

void check_curves(const CoatingSetting& setting, Faults& faults) {
  const auto& known = setting.measured()->wavelengths_nm;
  const auto fails = std::ranges::find_if(setting.wavelengths_nm, [&](double wavelength) {
    return wavelength < known.front() || wavelength > known.back();
  });
  if (fails != setting.wavelengths_nm.end())
    faults.add({{},
                fmt::format("'{}' was measured from {} to {} nm; {} nm lies outside", setting.coating->name,
                            known.front(), known.back(), *fails),
                {},
                {}});
}

/// Each medium is told of once, at the first wavelength where it fails.
void check_media(const Assembly& assembly, const CoatingSetting& setting, Faults& faults) {
  check_incident(setting, faults);
  if (setting.substrate.name != setting.incident.name)
    if (auto fault = outside_range(setting.substrate, setting.wavelengths_nm))
      faults.add(std::move(*fault));
  if (setting.measured())
    check_curves(setting, faults);
  if (!setting.layers())
    return;
  for (const double wavelength : setting.wavelengths_nm)
    if (auto fault = assembly::unknown_layer(assembly, *setting.layers(), wavelength)) {
      faults.add(std::move(*fault));
      return;
    }
}

} // namespace

std::optional<CoatingSetting> coating_setting(const Assembly& assembly, const CoatingRequest& request,
                                              Faults& faults) {
  const auto id = assembly::coating_named(assembly, request.name);
  if (!id && request.name != bare) {
    faults.add(unknown_coating(assembly, request.name));
    return std::nullopt;
  }
  const Coating* coating = id ? &assembly.coatings[*id] : nullptr;
  std::optional<Medium> incident = named_medium(assembly, request.incident, "--incident", faults);
  std::optional<Medium> substrate = substrate_of(assembly, coating, request, faults);
  if (!incident || !substrate)
    return std::nullopt;
  CoatingSetting setting{coating, std::move(*incident), std::move(*substrate),
                         wavelengths_of(assembly, request)};
  check_media(assembly, setting, faults);
  return faults.none() ? std::optional(std::move(setting)) : std::nullopt;
}

} // namespace lightledger::analysis
