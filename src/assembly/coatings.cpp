#include "coatings.hpp"

#include "ideal.hpp"
#include "plain_text.hpp"

#include <fmt/format.h>

#include <utility>

namespace lightledger::assembly {

namespace {

constexpr std::string_view kinds = "{layers: […]}, {ideal: {reflect: R}} or {measured: curves.csv}";
constexpr std::string_view layer_forms =
    "{medium: M, waves: 0.25, at: 532}, {medium: M, thickness: 96.1} or {repeat: 6, layers: […]}";
constexpr std::string_view layers_example = "a list of layers from the substrate outward";

} // namespace

void Coatings::read(Value section) {
  if (m_reader.node(section).kind != Node::Kind::mapping)
    return m_reader.not_a_mapping(section, "coatings",
                                  "names of coatings: {neutral: {ideal: {reflect: 0.005}}}");
  for (const Node::Entry& entry : m_reader.node(section).entries) {
    const std::size_t before = m_reader.fault_count();
    check_own_name(m_reader, entry);
    m_ids.emplace(entry.key, static_cast<CoatingId>(m_coatings.size()));
    m_written.emplace_back();
    m_coatings.push_back({entry.key, read_kind({entry.value, entry.key})});
    m_sound.push_back(m_reader.fault_count() == before);
  }
}

std::optional<CoatingId> Coatings::named(Value value) {
  const auto name = m_reader.name(value);
  if (!name)
    return std::nullopt;
  if (const auto known = m_ids.find(*name); known != m_ids.end())
    return known->second;
  m_reader.fault_from([&] {
    std::vector<std::string_view> names;
    for (const Coating& coating : m_coatings)
      names.emplace_back(coating.name);
    return Fault{m_reader.mark(value), fmt::format("no coating is called {}", quoted(*name)),
                 "a name from this file's coatings", m_reader.suggest(*name, names)};
  });
  return std::nullopt;
}

decltype(Coating::kind) Coatings::read_kind(Value value) {
  auto coating = Mapping::read(m_reader, value, "a coating", kinds);
  if (!coating)
    return Ideal{};
  decltype(Coating::kind) kind = Ideal{};
  const auto form = coating->need_one_of({"layers", "ideal", "measured"}, kinds);
  if (form == "layers") {
    Layers layers;
    read_layers(*coating->take("layers"), fmt::format("coatings.{}.layers", value.label), layers.films);
    kind = std::move(layers);
  } else if (form == "ideal") {
    kind = read_ideal(m_reader, *coating->take("ideal"));
  } else if (form == "measured") {
    WrittenCurves& written = m_written_curves[static_cast<CoatingId>(m_coatings.size())];
    kind = m_curves.read(*coating->take("measured"), value.label, written);
  }
  coating->finish();
  return kind;
}

void Coatings::read_layers(Value value, const std::string& address, std::vector<Film>& films) {
  const auto items = m_reader.items(value, layers_example);
  if (!items)
    return;
  for (std::size_t i = 0; i < items->size(); ++i)
    read_layer((*items)[i], fmt::format("{}[{}]", address, i), films);
}

void Coatings::read_layer(Value value, const std::string& address, std::vector<Film>& films) {
  auto layer = Mapping::read(m_reader, value, "a layer", layer_forms);
  if (!layer)
    return;
  if (const auto times = layer->take("repeat")) {
    layer->call("a repeat");
    read_repeat(*layer, *times, address, films);
  } else {
    read_film(*layer, address, films);
  }
  layer->finish();
}

void Coatings::read_repeat(Mapping& layer, Value times, const std::string& address,
                           std::vector<Film>& films) {
  const auto count = m_reader.count(times);
  const auto inner = layer.need("layers");
  const std::size_t first = films.size();
  if (inner)
    read_layers(*inner, address + ".layers", films);
  const std::size_t group = films.size() - first;
  const std::uint64_t more = count ? (*count - 1) * std::min(group, most_films) : 0;
  if (!room_for(more, layer.key_mark("repeat")))
    return;
  films.reserve(films.size() + more);
  for (std::uint64_t i = 0; i < more; ++i)
    films.push_back(Film(films[films.size() - group]));
}

void Coatings::read_film(Mapping& layer, const std::string& address, std::vector<Film>& films) {
  WrittenFilm written{};
  const auto name = layer.need("medium");
  const auto medium = name ? m_media.named(*name) : std::nullopt;
  const auto thickness = read_thickness(layer, written);
  if (!medium || !thickness || !room_for(1, layer.mark()))
    return;
  written.medium = *medium;
  written.mark = m_reader.mark(*name);
  m_written.back().push_back(written);
  films.push_back({*medium, *thickness, address});
}

std::optional<std::variant<double, Film::Waves>> Coatings::read_thickness(Mapping& layer,
                                                                          WrittenFilm& written) {
  const auto form = layer.need_one_of({"waves", "thickness"}, layer_forms);
  const auto at_value = layer.take("at");
  if (form == "thickness") {
    if (at_value)
      m_reader.fault(layer.key_mark("at"), "'at' goes with 'waves', not with 'thickness'",
                     std::string(layer_forms));
    return layer.number("thickness", Unit::nanometres, Bound::not_negative);
  }
  if (form != "waves")
    return std::nullopt;
  const auto waves = layer.number("waves", Unit::none, Bound::not_negative);
  const auto at = at_value ? at_value : layer.need("at");
  const auto at_nm = at ? m_reader.number(*at, Unit::nanometres, Bound::positive) : std::nullopt;
  if (!waves || !at_nm)
    return std::nullopt;
  written.at_nm = *at_nm;
  written.at_mark = m_reader.mark(*at);
  return Film::Waves{*waves, *at_nm};
}

bool Coatings::room_for(std::size_t more, Mark mark) {
  if (m_films + more > most_films) {
    if (!std::exchange(m_overfull, true))
      m_reader.fault(
          mark, fmt::format("the file's coatings have more than {} layers, repeats written out", most_films));
    return false;
  }
  m_films += more;
  return true;
}

} // namespace lightledger::assembly
