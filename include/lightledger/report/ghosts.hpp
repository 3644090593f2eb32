#pragma once

#include <lightledger/analysis/ghosts.hpp>
#include <lightledger/assembly/assembly.hpp>
#include <lightledger/report/envelope.hpp>
#include <lightledger/report/named_file.hpp>
#include <lightledger/report/text_style.hpp>

#include <chrono>
#include <string>
#include <vector>

namespace lightledger::report {

/// The ghosts as the JSON document of contract §5. `unlisted` tells of the paths that the list leaves out;
/// `returned_paths` stands only where it was asked for.
[[nodiscard]] std::string ghosts_json(const Envelope& envelope, const analysis::Ghosts& ghosts,
                                      bool with_returned);

/// One row a path (RFC 4180), its bounces in one cell, apart by " > ".
[[nodiscard]] std::string ghosts_csv(const analysis::Ghosts& ghosts);

struct GhostsTextOptions {
  std::size_t rows = 10; ///< paths in the table
  bool returned = false; ///< the paths that leave through the first station too
};

/// The ghosts for a person: the brightest paths, what all of them bring, what is certain about the rest, what
/// to do, warnings last.
[[nodiscard]] std::string ghosts_text(const assembly::Assembly& assembly, const analysis::Ghosts& ghosts,
                                      const std::vector<std::string>& warnings,
                                      std::chrono::duration<double> elapsed, const GhostsTextOptions& options,
                                      const TextStyle& style);

/// Maps as PNG: `image.png`, `ghost-01.png` and so on, and `ghosts.png`, the sum of these ghosts.
[[nodiscard]] std::vector<NamedFile> ghosts_files(const analysis::Ghosts& ghosts);

} // namespace lightledger::report
