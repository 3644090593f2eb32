#include "plain_text.hpp"
#include "train.hpp"

#include <fmt/format.h>

namespace lightledger::assembly {

namespace {

constexpr std::string_view coating_forms = "the name of a coating, or {use: name, substrate: before|after}";
constexpr std::string_view substrate_forms =
    "{use: name, substrate: before} or {use: name, substrate: after}";

} // namespace

void Train::read_refracting(Mapping& station, Surface& surface) {
  const auto into = station.need("into");
  station.forbid("rear",
                 "belongs to a reflecting station; at this one the back face is a station of its own");
  const auto coating = read_coating(station);
  surface.roughness_nm = station.number_or(0.0, "roughness", Unit::nanometres, Bound::not_negative);
  surface.beyond = into ? m_media.named(*into) : std::nullopt;
  if (surface.beyond)
    m_coverage.check_transparent(*surface.beyond, m_reader.mark(*into));
  if (coating)
    surface.coating = placed(*coating, surface);
  m_current = surface.beyond.value_or(m_current);
  m_current_known = surface.beyond.has_value();
}

void Train::read_reflecting(Mapping& station, Surface& surface) {
  const auto backing = station.take("backing");
  const auto coating = read_coating(station);
  surface.roughness_nm = station.number_or(0.0, "roughness", Unit::nanometres, Bound::not_negative);
  surface.beyond = backing ? m_media.named(*backing) : std::nullopt;
  if (surface.beyond)
    m_coverage.check_known(*surface.beyond, m_reader.mark(*backing));
  if (!backing && !station.has("coating"))
    m_reader.fault(station.mark(), "a reflecting station needs a 'backing' or a 'coating'",
                   "backing: Al, or the name of a coating");
  if (!backing && coating && m_coatings.sound(coating->id) && m_coatings.layered(coating->id))
    m_reader.fault(coating->mark, "the layers of a coating need a 'backing' to stand on",
                   "backing: fused-silica");
  else if (coating && (surface.beyond || !backing))
    surface.coating = placed(*coating, surface);
}

std::optional<Train::CoatingWritten> Train::read_coating(Mapping& station) {
  const auto value = station.take("coating");
  if (!value)
    return std::nullopt;
  const auto coating = read_coating_use(*value);
  if (coating)
    check_coating(coating->id);
  return coating;
}

std::optional<Train::CoatingWritten> Train::read_coating_use(Value value) {
  if (m_reader.node(value).kind == Node::Kind::scalar) {
    const auto id = m_coatings.named(value);
    return id ? std::optional(CoatingWritten{*id, std::nullopt, m_reader.mark(value)}) : std::nullopt;
  }
  auto mapping = Mapping::read(m_reader, value, "the use of a coating", coating_forms);
  if (!mapping)
    return std::nullopt;
  const auto use = mapping->need("use");
  const auto substrate = mapping->take("substrate");
  mapping->finish();
  const auto id = use ? m_coatings.named(*use) : std::nullopt;
  const auto side = substrate ? m_reader.word(*substrate, {"before", "after"}) : std::nullopt;
  if (!id)
    return std::nullopt;
  CoatingWritten written{*id, std::nullopt, m_reader.mark(*use)};
  if (substrate)
    written.substrate = side == "before" ? Side::before : Side::beyond;
  return written;
}

CoatingUse Train::placed(const CoatingWritten& coating, const Surface& surface) {
  CoatingUse use{coating.id, coating.substrate.value_or(Side::beyond)};
  const bool has_side = m_coatings.sound(coating.id) && !m_coatings.ideal(coating.id);
  if (has_side && !coating.substrate && m_current_known && surface.beyond)
    use.substrate = side_with_body(coating, surface.before, *surface.beyond);
  return use;
}

/// Layers stand on the side that is not a gas (contract §3). Curves were measured on something like that, but
/// do without where there is no such side.
Side Train::side_with_body(const CoatingWritten& coating, MediumId before, MediumId beyond) {
  const auto gas_before = m_coverage.gas(before);
  const auto gas_beyond = m_coverage.gas(beyond);
  if (!gas_before || !gas_beyond)
    return Side::beyond;
  if (*gas_before == *gas_beyond && !m_coatings.layered(coating.id))
    return Side::beyond;
  if (*gas_before == *gas_beyond)
    m_reader.fault(coating.mark,
                   fmt::format("{} of {} and {} is a gas: on which side do the layers stand?",
                               *gas_before ? "each" : "neither", m_assembly.media[before].name,
                               m_assembly.media[beyond].name),
                   std::string(substrate_forms));
  return *gas_before ? Side::beyond : Side::before;
}

void Train::check_coating(CoatingId id) {
  if (m_coating_used[id])
    return;
  m_coating_used[id] = true;
  for (const WrittenFilm& film : m_coatings.written(id)) {
    m_coverage.check_known(film.medium, film.mark);
    if (film.at_nm)
      m_coverage.check_known_at(film.medium, *film.at_nm, film.at_mark);
  }
  if (m_coatings.sound(id))
    check_curves(id);
}

void Train::check_curves(CoatingId id) {
  const auto* const measured = std::get_if<Measured>(&m_coatings.kind(id));
  if (measured == nullptr)
    return;
  const WrittenCurves& written = m_coatings.written_curves(id);
  m_coverage.check_measured(*measured, written.file, written.mark);
  if (measured->from)
    m_coverage.check_transparent(*measured->from, written.from_mark);
}

} // namespace lightledger::assembly
