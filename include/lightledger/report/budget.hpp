#pragma once

#include <lightledger/analysis/budget.hpp>
#include <lightledger/analysis/remedy.hpp>
#include <lightledger/assembly/assembly.hpp>
#include <lightledger/report/envelope.hpp>
#include <lightledger/report/text_style.hpp>

#include <chrono>
#include <string>

namespace lightledger::report {

/// The budget as the JSON document of contract §5; split ledgers only where there are any.
[[nodiscard]] std::string budget_json(const Envelope& envelope, const analysis::Budget& budget);

/// One row a station (RFC 4180) for all light, then for each wavelength and each field the detector's row with
/// what is delivered of that light, or the rows of all stations where there are split ledgers. The last columns
/// name the wavelength or field; they are empty in the rows for all light.
[[nodiscard]] std::string budget_csv(const analysis::Budget& budget);

/// The budget for a person: the stations' table, what is delivered, the three largest losses and what better
/// coatings would bring, the tables by wavelength and field where there is more than one, warnings last.
[[nodiscard]] std::string budget_text(const assembly::Assembly& assembly, const analysis::Budget& budget,
                                      const std::vector<analysis::Remedy>& remedies,
                                      const std::vector<std::string>& warnings,
                                      std::chrono::duration<double> elapsed, const TextStyle& style);

} // namespace lightledger::report
