#pragma once

#include <nlohmann/json.hpp>

#include <string>
#include <vector>

namespace lightledger::schema {

using Json = nlohmann::json;

/// One thing in an instance that a schema refuses.
struct Violation {
  std::string address; ///< of the value, as the assembly's addresses go: `train[2].gap`; empty: the whole
  std::string keyword; ///< of the schema, as "required"
  std::string found;   ///< the value or key concerned
  std::vector<std::string> known; ///< for "additionalProperties": the keys that are accepted there
};

/// Of JSON Schema (draft 2020-12) the keywords that the assembly's schema uses, references within the schema
/// only.
class Validator {
public:
  explicit Validator(Json schema) : m_schema(std::move(schema)) {}

  /// All violations; none where the instance is valid. Of alternatives that all fail, those of each.
  /// Throws std::invalid_argument where the schema has a keyword or a reference that is not known.
  [[nodiscard]] std::vector<Violation> check(const Json& instance) const;

private:
  Json m_schema;
};

} // namespace lightledger::schema
