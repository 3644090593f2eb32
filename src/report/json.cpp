#include "json.hpp"

#include <cmath>

namespace lightledger::report {

Json number(std::optional<double> value) {
  if (!value || !std::isfinite(*value))
    return nullptr;
  return *value + 0.0;
}

Json text_or_null(const std::optional<std::string>& value) {
  return value ? Json(*value) : Json(nullptr);
}

std::string json_document(const Envelope& envelope, const char* key, Json result) {
  Json document;
  document["lightledger"] = envelope.version;
  document["contract"] = 1;
  document["command"] = envelope.command;
  document["title"] = text_or_null(envelope.title);
  document["warnings"] = envelope.warnings;
  document[key] = std::move(result);
  return document.dump(2, ' ', false, Json::error_handler_t::replace) + '\n';
}

} // namespace lightledger::report
