#pragma once

#include <lightledger/analysis/budget.hpp>
#include <lightledger/assembly/assembly.hpp>
#include <lightledger/report/envelope.hpp>
#include <lightledger/report/text_style.hpp>

#include <chrono>
#include <string>

namespace lightledger::report {

/// The budget as the JSON document of contract §5; split ledgers only where there are any.
[[nodiscard]] std::string budget_json(const Envelope& envelope, const analysis::Budget& budget);

/// One row a station (RFC 4180). With split ledgers a first column names the wavelength or the field: the
/// rows of the whole come first, with that cell empty.
[[nodiscard]] std::string budget_csv(const analysis::Budget& budget);

/// The budget for a person: the stations' table, what is delivered, the three largest losses, the tables by
/// wavelength and field where there is more than one, warnings last.
[[nodiscard]] std::string budget_text(const assembly::Assembly& assembly, const analysis::Budget& budget,
                                      const std::vector<std::string>& warnings,
                                      std::chrono::duration<double> elapsed, const TextStyle& style);

} // namespace lightledger::report
