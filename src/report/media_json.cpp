#include "json.hpp"

#include <lightledger/report/media.hpp>

namespace lightledger::report {
namespace {

Json row_json(const analysis::MediumRow& row) {
  const auto& index = row.index;
  return {{"wavelength_nm", number(row.wavelength_nm)},
          {"n", number(index ? std::optional(index->n) : std::nullopt)},
          {"kappa", number(index ? std::optional(index->kappa) : std::nullopt)}};
}

Json medium_json(const analysis::MediumEntry& medium) {
  Json json{{"name", medium.name},
            {"range_nm", Json::array({number(medium.range.from_nm), number(medium.range.to_nm)})},
            {"index_587", number(medium.index_587)},
            {"source", medium.source}};
  if (medium.rows.empty())
    return json;
  json["rows"] = Json::array();
  for (const analysis::MediumRow& row : medium.rows)
    json["rows"].push_back(row_json(row));
  return json;
}

} // namespace

std::string media_json(const Envelope& envelope, const std::vector<analysis::MediumEntry>& media) {
  Json json = Json::array();
  for (const analysis::MediumEntry& medium : media)
    json.push_back(medium_json(medium));
  return json_document(envelope, "media", std::move(json));
}

} // namespace lightledger::report
