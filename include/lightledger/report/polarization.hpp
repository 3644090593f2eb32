#pragma once

#include <lightledger/analysis/polarization.hpp>
#include <lightledger/assembly/assembly.hpp>
#include <lightledger/report/envelope.hpp>
#include <lightledger/report/named_file.hpp>
#include <lightledger/report/text_style.hpp>

#include <chrono>
#include <string>
#include <vector>

namespace lightledger::report {

/// The figures as the JSON document of contract §5; a table or a remedy only where there is one.
[[nodiscard]] std::string polarization_json(const Envelope& envelope, const assembly::Assembly& assembly,
                                            const analysis::Polarization& polarization);

/// One row a station (RFC 4180): the chief ray's state behind it, what it does alone, what it is blamed for.
/// Where a table against something was made, that table instead.
[[nodiscard]] std::string polarization_csv(const analysis::Polarization& polarization);

/// The figures for a person: the chief ray from station to station, all light at the detector, who is to
/// blame, what can be done, warnings last.
[[nodiscard]] std::string polarization_text(const assembly::Assembly& assembly,
                                            const analysis::Polarization& polarization,
                                            const std::vector<std::string>& warnings,
                                            std::chrono::duration<double> elapsed, const TextStyle& style);

/// The maps of each field as PNG, all of them as `pupil.csv`, and a table against something as CSV and SVG.
[[nodiscard]] std::vector<NamedFile> polarization_files(const assembly::Assembly& assembly,
                                                        const analysis::Polarization& polarization);

} // namespace lightledger::report
