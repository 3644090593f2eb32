#pragma once

#include <lightledger/analysis/medium_table.hpp>
#include <lightledger/report/envelope.hpp>
#include <lightledger/report/text_style.hpp>

#include <string>
#include <vector>

namespace lightledger::report {

/// The media as the JSON document of contract §5; rows only with wavelengths.
[[nodiscard]] std::string media_json(const Envelope& envelope,
                                     const std::vector<analysis::MediumEntry>& media);

/// One row a medium, or with wavelengths one row a medium and wavelength (RFC 4180).
[[nodiscard]] std::string media_csv(const std::vector<analysis::MediumEntry>& media);

/// One line a medium, sources cut to the width; or, of a single one, its source in full and its table; warnings last.
[[nodiscard]] std::string media_text(const std::vector<analysis::MediumEntry>& media,
                                     const std::vector<std::string>& warnings, const TextStyle& style);

} // namespace lightledger::report
