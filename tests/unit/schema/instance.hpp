#pragma once

#include "validator.hpp"

#include <lightledger/assembly/document.hpp>

namespace lightledger::schema {

/// The document as JSON, its scalars read in the core schema of YAML 1.2; `.inf` and the like, which JSON
/// does not have, stay text.
[[nodiscard]] Json instance(const assembly::Document& document);

} // namespace lightledger::schema
