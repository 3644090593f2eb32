#pragma once

#include <string>
#include <vector>

namespace lightledger::published {

/// One line of docs/validation.md; empty cells are dashes there.
struct Row {
  std::string quantity, published, origin, computed, ours, within, test;
};

/// One section of docs/validation.md.
struct Case {
  std::string id, title, source;
  std::vector<Row> rows;
};

/// Enters a row; the first row of an id opens its section.
void enter(const std::string& id, const std::string& title, const std::string& source, Row row);

/// The document: cases grouped by the letters of their ids and sorted by the numbers.
[[nodiscard]] std::string validation_document(std::vector<Case> cases);

} // namespace lightledger::published
