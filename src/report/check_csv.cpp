#include "csv.hpp"
#include "requirement_words.hpp"

#include <lightledger/report/check.hpp>

namespace lightledger::report {

std::string check_csv(const analysis::Judgement& judgement) {
  Csv csv;
  for (const char* heading : {"quantity", "sense", "limit", "value", "uncertainty", "margin", "met"})
    csv.cell(heading);
  csv.end_row();
  for (const analysis::Verdict& verdict : judgement.verdicts) {
    csv.cell(verdict.quantity).cell(sense_key(verdict.sense)).cell(verdict.limit).cell(verdict.value);
    csv.cell(verdict.uncertainty).cell(verdict.margin);
    csv.cell(!verdict.met ? "" : *verdict.met ? "true" : "false");
    csv.end_row();
  }
  return csv.text();
}

} // namespace lightledger::report
