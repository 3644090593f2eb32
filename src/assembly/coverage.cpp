#include "coverage.hpp"

#include "plain_text.hpp"

#include <lightledger/assembly/films.hpp>

#include <fmt/format.h>

#include <algorithm>

namespace lightledger::assembly {

namespace {

/// What is found from X rays to millimetre waves is well within; beyond, rounding breaks the energy balance.
constexpr double least_index = 1e-3;
constexpr double largest_index = 1e3;

bool strange(optics::Index index) {
  return index.n < least_index || index.n > largest_index || index.kappa > largest_index;
}

} // namespace

const Coverage::Known& Coverage::known(MediumId id) {
  m_known.resize(std::max<std::size_t>(m_known.size(), m_media.size()));
  if (m_known[id])
    return *m_known[id];
  Known& known = m_known[id].emplace();
  for (const Wavelength& wavelength : m_wavelengths) {
    const auto index = optics::index_at(m_media[id], wavelength.nm);
    if (!index && !known.missing_nm)
      known.missing_nm = wavelength.nm;
    if (index && strange(*index) && !known.strange_nm)
      known.strange_nm = wavelength.nm;
    if (index && optics::opaque(*index) && !known.opaque_nm)
      known.opaque_nm = wavelength.nm;
    known.gas = known.gas && index && optics::gas(*index);
  }
  return known;
}

void Coverage::check_known(MediumId id, Mark use) {
  if (const auto missing = known(id).missing_nm)
    m_reader.fault(use, fmt::format("{}; the light has {} nm", known_range(m_media[id]), *missing));
  if (const auto strange = known(id).strange_nm)
    refuse_strange(id, *strange, use);
}

void Coverage::check_known_at(MediumId id, double nm, Mark use) {
  const auto index = optics::index_at(m_media[id], nm);
  if (!index)
    m_reader.fault(use, fmt::format("{}; the layer is given at {} nm", known_range(m_media[id]), nm));
  else if (strange(*index))
    refuse_strange(id, nm, use);
}

void Coverage::refuse_strange(MediumId id, double nm, Mark use) {
  const optics::Index index = optics::index_at(m_media[id], nm).value();
  m_reader.fault(
      use,
      fmt::format("{} has the index {:.6g} + {:.6g}i at {} nm", m_media[id].name, index.n, index.kappa, nm),
      fmt::format("an index from {} to {}, kappa up to {}", least_index, largest_index, largest_index));
}

void Coverage::check_transparent(MediumId id, Mark use) {
  check_known(id, use);
  if (const auto opaque = known(id).opaque_nm)
    m_reader.fault(use,
                   fmt::format("{} is opaque at {} nm, so no light goes on in it", m_media[id].name, *opaque),
                   "a medium of kappa up to 1e-3; a metal is the backing of a reflecting station");
}

void Coverage::check_measured(const Measured& measured, std::string_view file, Mark use) {
  const double from = measured.wavelengths_nm.front();
  const double to = measured.wavelengths_nm.back();
  const auto beyond = std::find_if(m_wavelengths.begin(), m_wavelengths.end(),
                                   [&](const Wavelength& light) { return light.nm < from || light.nm > to; });
  if (beyond != m_wavelengths.end())
    m_reader.fault(use, fmt::format("{} reaches from {} to {} nm; the light has {} nm", quoted(file), from,
                                    to, beyond->nm));
}

std::optional<bool> Coverage::gas(MediumId id) {
  if (m_wavelengths.empty() || known(id).missing_nm)
    return std::nullopt;
  return known(id).gas;
}

} // namespace lightledger::assembly
