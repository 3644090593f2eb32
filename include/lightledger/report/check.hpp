#pragma once

#include <lightledger/analysis/requirements.hpp>
#include <lightledger/report/envelope.hpp>
#include <lightledger/report/text_style.hpp>

#include <string>
#include <vector>

namespace lightledger::report {

/// The judgement of a sound file as the JSON document of contract §5.
[[nodiscard]] std::string check_json(const Envelope& envelope, const analysis::Judgement& judgement);

/// One row a requirement (RFC 4180); `met` is empty where it cannot be told.
[[nodiscard]] std::string check_csv(const analysis::Judgement& judgement);

/// The judgement for a person: the requirements' table, the verdict in a sentence, warnings last.
[[nodiscard]] std::string check_text(const assembly::Assembly& assembly, const analysis::Judgement& judgement,
                                     const std::vector<std::string>& warnings, const TextStyle& style);

} // namespace lightledger::report
