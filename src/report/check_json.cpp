#include "json.hpp"
#include "requirement_words.hpp"

#include <lightledger/report/check.hpp>

namespace lightledger::report {
namespace {

Json verdict_json(const analysis::Verdict& verdict) {
  return {{"quantity", verdict.quantity},
          {"sense", sense_key(verdict.sense)},
          {"limit", number(verdict.limit)},
          {"value", number(verdict.value)},
          {"uncertainty", number(verdict.uncertainty)},
          {"margin", number(verdict.margin)},
          {"met", verdict.met ? Json(*verdict.met) : Json(nullptr)}};
}

} // namespace

std::string check_json(const Envelope& envelope, const analysis::Judgement& judgement) {
  Json requirements = Json::array();
  for (const analysis::Verdict& verdict : judgement.verdicts)
    requirements.push_back(verdict_json(verdict));
  Json json{{"sound", true}, {"requirements", requirements}, {"all_met", judgement.all_met()}};
  return json_document(envelope, "check", std::move(json));
}

} // namespace lightledger::report
