#pragma once

#include "answer.hpp"
#include "options.hpp"

#include <lightledger/assembly/diagnostics.hpp>
#include <lightledger/report/envelope.hpp>
#include <lightledger/report/text_style.hpp>

#include <string>
#include <vector>

/// What the answers of several commands are made of.
namespace lightledger::app {

using Warnings = std::vector<std::string>;

/// The documents asked for, each made by its writer only then.
template <class Json, class Csv, class Text>
Answer written(const Options& options, Json json, Csv csv, Text text) {
  Answer answer;
  if (options.json)
    answer.json = json();
  if (options.csv)
    answer.csv = csv();
  if (!options.quiet)
    answer.text = text();
  return answer;
}

[[nodiscard]] report::TextStyle style_of(const Options& options);

[[nodiscard]] report::Envelope envelope_of(const Options& options, const Input& input, Warnings warnings);

/// The warnings of reading the file, then those of the analysis.
[[nodiscard]] Warnings joined(const Input& input, const Warnings& later);

/// Throws InputError with a report of the faults, where there are any.
void refuse_file(const assembly::Faults& faults, const Input& input);
/// The same of faults of the command line.
void refuse_request(const assembly::Faults& faults, const Options& options);

} // namespace lightledger::app
