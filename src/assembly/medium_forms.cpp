#include "medium_forms.hpp"

#include "mapping.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <utility>

namespace lightledger::assembly {

namespace {

constexpr std::string_view forms = "one of index, sellmeier, cauchy, table";

optics::ConstantIndex read_index(Mapping& medium) {
  const double n = medium.number_or(1.5, "index", Unit::none, Bound::positive);
  return {n, medium.number_or(0.0, "kappa", Unit::none, Bound::not_negative)};
}

/// Coefficients that must be there, at least one.
std::vector<double> coefficients(Reader& reader, Mapping& formula, std::string_view key) {
  const auto value = formula.need(key);
  return value ? reader.numbers(*value, Unit::none, Bound::any).value_or(std::vector<double>{})
               : std::vector<double>{};
}

optics::Sellmeier read_sellmeier(Reader& reader, Value value) {
  optics::Sellmeier sellmeier;
  auto formula =
      Mapping::read(reader, value, "a Sellmeier formula", "{A: 1, B: [b1, b2, …], C_um2: [c1, c2, …]}");
  if (!formula)
    return sellmeier;
  const std::size_t before = reader.fault_count();
  sellmeier.A = formula->number_or(1.0, "A", Unit::none, Bound::any);
  sellmeier.B = coefficients(reader, *formula, "B");
  sellmeier.C_um2 = coefficients(reader, *formula, "C_um2");
  formula->finish();
  if (reader.fault_count() == before && sellmeier.B.size() != sellmeier.C_um2.size())
    reader.fault(formula->key_mark("C_um2"), fmt::format("'C_um2' has {} numbers, but 'B' has {}",
                                                         sellmeier.C_um2.size(), sellmeier.B.size()));
  return sellmeier;
}

optics::Cauchy read_cauchy(Reader& reader, Value value) {
  auto formula = Mapping::read(reader, value, "a Cauchy formula", "{A: [a0, a1, …]}");
  if (!formula)
    return {};
  optics::Cauchy cauchy{coefficients(reader, *formula, "A")};
  formula->finish();
  return cauchy;
}

/// Cells of one row as they are to be read, in the order of the columns.
struct Column {
  Unit unit;
  Bound bound;
};

/// Rows of numbers whose first column, a wavelength, ascends.
template <std::size_t N>
std::vector<std::array<double, N>>
read_rows(Reader& reader, Value value, const std::array<Column, N>& columns, std::string_view accepted) {
  std::vector<std::array<double, N>> rows;
  const auto items = reader.items(value, accepted);
  for (const Value item : items.value_or(std::vector<Value>{})) {
    const Node& cells = reader.node(item);
    if (cells.kind != Node::Kind::sequence || cells.items.size() != N) {
      reader.fault(cells.mark, fmt::format("a row of '{}' is not {} numbers", value.label, N),
                   std::string(accepted));
      continue;
    }
    std::array<double, N> row{};
    const std::size_t before = reader.fault_count();
    for (std::size_t i = 0; i < N; ++i)
      row[i] = reader.number({cells.items[i], value.label}, columns[i].unit, columns[i].bound).value_or(0.0);
    if (reader.fault_count() != before)
      continue;
    if (!rows.empty() && row[0] <= rows.back()[0])
      reader.fault(cells.mark, fmt::format("the wavelengths of '{}' do not ascend: {} nm after {} nm",
                                           value.label, row[0], rows.back()[0]));
    rows.push_back(row);
  }
  return rows;
}

optics::IndexTable read_table(Reader& reader, Value value) {
  constexpr std::array<Column, 3> columns{{{Unit::nanometres, Bound::positive},
                                           {Unit::none, Bound::positive},
                                           {Unit::none, Bound::not_negative}}};
  optics::IndexTable table;
  for (const auto& [wavelength, n, kappa] :
       read_rows(reader, value, columns, "rows of [wavelength in nm, n, kappa]"))
    table.rows.push_back({wavelength, n, kappa});
  return table;
}

optics::InternalTransmittance read_transmittance(Reader& reader, Value value) {
  constexpr std::array<Column, 2> columns{
      {{Unit::nanometres, Bound::positive}, {Unit::fraction, Bound::share}}};
  constexpr std::string_view rows = "rows of [wavelength in nm, transmittance]";
  optics::InternalTransmittance result;
  auto mapping = Mapping::read(reader, value, "an internal transmittance",
                               "{thickness_mm: 10, table: [[wavelength in nm, transmittance], …]}");
  if (!mapping)
    return result;
  if (const auto thickness = mapping->need("thickness_mm"))
    result.thickness_mm = reader.number(*thickness, Unit::millimetres, Bound::positive).value_or(1.0);
  if (const auto table = mapping->need("table"))
    for (const auto& [wavelength, transmittance] : read_rows(reader, *table, columns, rows)) {
      if (transmittance == 0.0)
        reader.fault(reader.mark(*table),
                     fmt::format("the transmittance at {} nm is 0; it must be above", wavelength));
      result.rows.push_back({wavelength, transmittance});
    }
  mapping->finish();
  return result;
}

optics::Dispersion read_dispersion(Reader& reader, Mapping& medium) {
  const auto form = medium.need_one_of({"index", "sellmeier", "cauchy", "table"}, forms);
  if (form == "index")
    return read_index(medium);
  if (form == "sellmeier")
    return read_sellmeier(reader, *medium.take("sellmeier"));
  if (form == "cauchy")
    return read_cauchy(reader, *medium.take("cauchy"));
  if (form == "table")
    return read_table(reader, *medium.take("table"));
  return optics::ConstantIndex{1.5, 0.0};
}

void check_absorption(Reader& reader, Mapping& medium, const optics::Medium& read) {
  const auto kappa = medium.take("kappa");
  if (!kappa)
    return;
  if (!std::holds_alternative<optics::ConstantIndex>(read.dispersion))
    reader.fault(medium.key_mark("kappa"), "'kappa' goes with 'index' alone",
                 "a table of [wavelength, n, kappa]");
  else if (read.transmittance)
    reader.fault(medium.key_mark("kappa"), "'kappa' and 'internal_transmittance' say the same twice",
                 "one of them");
}

optics::Range read_range(Reader& reader, Mapping& mapping, optics::Range natural) {
  const auto value = mapping.take("range_nm");
  const auto ends = value ? reader.tuple<2>(*value, Unit::nanometres, Bound::positive) : std::nullopt;
  if (!ends)
    return natural;
  const optics::Range range{std::max((*ends)[0], natural.from_nm), std::min((*ends)[1], natural.to_nm)};
  if ((*ends)[0] > (*ends)[1])
    reader.fault(reader.mark(*value), "'range_nm' ends below its beginning", "[from, to] in nm");
  else if (range.from_nm > range.to_nm)
    reader.fault(reader.mark(*value),
                 fmt::format("the data are known from {} to {} nm, all outside 'range_nm'", natural.from_nm,
                             natural.to_nm));
  return range;
}

} // namespace

optics::Medium read_medium(Reader& reader, Value value) {
  optics::Medium medium{std::string(value.label), {}, {}, {}, {}};
  auto mapping = Mapping::read(reader, value, "a medium", "{index: 1.49}, or sellmeier, cauchy, table");
  if (!mapping)
    return medium;
  const std::size_t before = reader.fault_count();
  medium.dispersion = read_dispersion(reader, *mapping);
  if (const auto transmittance = mapping->take("internal_transmittance"))
    medium.transmittance = read_transmittance(reader, *transmittance);
  check_absorption(reader, *mapping, medium);
  if (const auto source = mapping->take("source"))
    medium.source = reader.name(*source).value_or("");
  const bool sound = reader.fault_count() == before;
  medium.range =
      read_range(reader, *mapping,
                 sound ? optics::natural_range(medium.dispersion, medium.transmittance) : optics::Range{});
  mapping->finish();
  if (reader.fault_count() != before)
    return {medium.name, optics::ConstantIndex{1.5, 0.0}, {}, {}, {}};
  return medium;
}

} // namespace lightledger::assembly
