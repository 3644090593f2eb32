#include "builtin.hpp"

#include <algorithm>
#include <array>
#include <iterator>

namespace lightledger::optics {
namespace {

constexpr BuiltinMedium air_and_vacuum[] = {
    {"air", ConstantIndex{}, {}, {}, "by convention: index 1, as catalogue indices are relative to air"},
    {"vacuum", ConstantIndex{}, {}, {}, "by definition; indices relative to air are not corrected for it"},
};

std::vector<double> listed(std::span<const double> values) {
  return {values.begin(), values.end()};
}

Dispersion written_out(const ConstantIndex& constant) {
  return constant;
}
Dispersion written_out(const SellmeierTerms& terms) {
  return Sellmeier{terms.A, listed(terms.B), listed(terms.C_um2)};
}
Dispersion written_out(const CauchyTerms& terms) {
  return Cauchy{listed(terms.A)};
}
Dispersion written_out(const IndexRows& table) {
  return IndexTable{{table.rows.begin(), table.rows.end()}};
}

std::optional<InternalTransmittance> written_out(const TransmittanceRows& table) {
  if (table.rows.empty())
    return std::nullopt;
  return InternalTransmittance{table.thickness_mm, {table.rows.begin(), table.rows.end()}};
}

using Group = std::span<const BuiltinMedium>;

std::array<Group, 2> all_groups() {
  return {Group{air_and_vacuum}, tabulated_media};
}

const BuiltinMedium* find(std::string_view name) {
  for (const Group group : all_groups())
    if (const auto found = std::ranges::find(group, name, &BuiltinMedium::name); found != group.end())
      return &*found;
  return nullptr;
}

std::vector<std::string_view> all_names() {
  std::vector<std::string_view> names;
  for (const Group group : all_groups())
    std::ranges::transform(group, std::back_inserter(names), &BuiltinMedium::name);
  return names;
}

} // namespace

const std::vector<std::string_view>& builtin_media() {
  static const std::vector<std::string_view> names = all_names();
  return names;
}

std::optional<Medium> builtin_medium(std::string_view name) {
  const BuiltinMedium* found = find(name);
  if (found == nullptr)
    return std::nullopt;
  Medium medium{std::string{name},
                std::visit([](const auto& form) { return written_out(form); }, found->dispersion),
                written_out(found->transmittance), found->range, std::string{found->source}};
  medium.range = medium.range.overlap(natural_range(medium.dispersion, medium.transmittance));
  return medium;
}

} // namespace lightledger::optics
