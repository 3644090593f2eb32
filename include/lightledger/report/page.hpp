#pragma once

#include <lightledger/analysis/budget.hpp>
#include <lightledger/analysis/drawing.hpp>
#include <lightledger/analysis/occurring_coatings.hpp>
#include <lightledger/analysis/requirements.hpp>
#include <lightledger/assembly/assembly.hpp>
#include <lightledger/report/envelope.hpp>
#include <lightledger/report/text_style.hpp>

#include <optional>
#include <string>
#include <vector>

namespace lightledger::report {

/// A map of the page as a PNG file, and what it shows in words.
struct PageMap {
  std::string png, words;
};

/// Everything that a page shows.
struct PageContent {
  Envelope envelope;
  std::string file, text;  ///< of the assembly
  analysis::Budget budget; ///< split both ways
  analysis::Judgement verdicts;
  analysis::Drawing drawing; ///< of one view
  std::vector<analysis::OccurringCoating> coatings;
  std::optional<std::string> ghosts, polarization; ///< the commands' JSON documents; none: not traced
  std::vector<analysis::PathPicture>
      paths;                 ///< the intended path, then the ghosts in the order of their document
  std::vector<PageMap> maps; ///< of the pupil
};

/// The whole analysis as one HTML file that needs nothing else: no network, no other file. The data in it are
/// the commands' own JSON documents.
[[nodiscard]] std::string page(const assembly::Assembly& assembly, const PageContent& content);

/// The page's data as a JSON document: each command's result under its name.
[[nodiscard]] std::string page_json(const assembly::Assembly& assembly, const PageContent& content);

/// What the page says, in a few lines, and where it is; warnings last.
[[nodiscard]] std::string page_text(const assembly::Assembly& assembly, const PageContent& content,
                                    const std::string& path, const TextStyle& style);

} // namespace lightledger::report
