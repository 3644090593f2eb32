#pragma once

#include <lightledger/report/envelope.hpp>

#include <nlohmann/json.hpp>

#include <optional>
#include <string>

namespace lightledger::report {

using Json = nlohmann::ordered_json;

/// A number in full double precision; null where it is none or not finite, and never −0.
[[nodiscard]] Json number(std::optional<double> value);

[[nodiscard]] Json text_or_null(const std::optional<std::string>& value);

/// The whole document: the envelope, then the result under its key. Bytes that are no UTF-8 are replaced.
[[nodiscard]] std::string json_document(const Envelope& envelope, const char* key, Json result);

} // namespace lightledger::report
