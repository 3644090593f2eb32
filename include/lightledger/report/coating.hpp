#pragma once

#include <lightledger/analysis/coating_curve.hpp>
#include <lightledger/report/envelope.hpp>
#include <lightledger/report/text_style.hpp>

#include <string>

namespace lightledger::report {

/// The curve as the JSON document of contract §5.
[[nodiscard]] std::string coating_json(const Envelope& envelope, const analysis::CoatingCurve& curve);

/// One row a wavelength and angle (RFC 4180), columns named as the JSON's keys.
[[nodiscard]] std::string coating_csv(const analysis::CoatingCurve& curve);

/// The curve for a person, with the range of its reflectance in a sentence; phases where the width allows.
[[nodiscard]] std::string coating_text(const analysis::CoatingCurve& curve,
                                       const std::vector<std::string>& warnings, const TextStyle& style);

} // namespace lightledger::report
