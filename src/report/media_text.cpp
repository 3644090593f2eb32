#include "display_width.hpp"
#include "figures.hpp"
#include "prose.hpp"
#include "table.hpp"

#include <lightledger/report/media.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace lightledger::report {
namespace {

using analysis::MediumEntry;

std::string in_words(const optics::Range& range) {
  if (std::isinf(range.to_nm))
    return range.from_nm > 0.0 ? fmt::format("from {}", plain(range.from_nm)) : "any";
  return fmt::format("{} to {}", plain(range.from_nm), plain(range.to_nm));
}

std::string index(std::optional<double> n) {
  return n ? fmt::format("{:.6f}", *n) : "-";
}

std::string extinction(std::optional<optics::Index> index) {
  return index && index->kappa != 0.0 ? fmt::format("{:.3e}", index->kappa) : "-";
}

std::string list_text(const std::vector<MediumEntry>& media, const TextStyle& style) {
  constexpr int others_width = 48; ///< of all columns but the source's
  Table table({{"medium", Align::left}, {"range nm", Align::left}, {"n 587.6 nm"}, {"source", Align::left}});
  for (const MediumEntry& medium : media)
    table.add({medium.name, in_words(medium.range), index(medium.index_587),
               shortened(medium.source, style.width - others_width)});
  return table.text(style.emphasis);
}

std::string rows_text(const MediumEntry& medium, bool emphasis) {
  Table table({{"wavelength nm"}, {"n", Align::right, 8}, {"kappa", Align::right, 9}});
  for (const analysis::MediumRow& row : medium.rows)
    table.add({plain(row.wavelength_nm), index(row.index ? std::optional(row.index->n) : std::nullopt),
               extinction(row.index)});
  return table.text(emphasis);
}

std::string medium_text(const MediumEntry& medium, const TextStyle& style) {
  std::string text = fmt::format("{}    {} nm    n at 587.6 nm: {}\n", medium.name, in_words(medium.range),
                                 index(medium.index_587));
  text += wrapped(fmt::format("Source: {}", medium.source), style.width);
  if (!medium.rows.empty())
    text.append("\n").append(rows_text(medium, style.emphasis));
  return text;
}

std::string tables_text(const std::vector<MediumEntry>& media, const TextStyle& style) {
  const auto has_rows = [](const MediumEntry& medium) { return !medium.rows.empty(); };
  if (media.size() > 1 && std::ranges::none_of(media, has_rows))
    return list_text(media, style);
  std::string text;
  for (const MediumEntry& medium : media)
    text.append(text.empty() ? "" : "\n").append(medium_text(medium, style));
  return text;
}

} // namespace

std::string media_text(const std::vector<MediumEntry>& media, const std::vector<std::string>& warnings,
                       const TextStyle& style) {
  return tables_text(media, style) + describe_warnings(warnings, style.width);
}

} // namespace lightledger::report
