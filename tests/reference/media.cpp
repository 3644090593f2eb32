#include "reference/media.hpp"

#include <stdexcept>

namespace lightledger::reference {

optics::Index index_of(const assembly::Assembly& assembly, assembly::MediumId medium, double wavelength_nm) {
  const optics::Medium& known = assembly.media.at(medium);
  const auto index = optics::index_at(known, wavelength_nm);
  if (!index)
    throw std::out_of_range("no index of " + known.name);
  return *index;
}

assembly::MediumId medium_behind(const assembly::Assembly& assembly, const assembly::Station& station,
                                 assembly::Side from) {
  const assembly::Surface& surface = assembly.surfaces.at(station.surface);
  const bool passes = station.intended == assembly::Act::pass;
  const bool ends_before = (from == assembly::Side::before) != passes;
  return ends_before ? surface.before : surface.beyond.value_or(surface.before);
}

} // namespace lightledger::reference
