#pragma once

#include "figure.hpp"

#include <lightledger/analysis/ghosts.hpp>

#include <optional>
#include <string_view>
#include <vector>

namespace lightledger::analysis {

/// The figure at a path in the JSON of the ghosts, without the leading `ghosts.`: `total`, `ledger.bulk`,
/// `paths[0].dop`, `paths[0].by_field[1].power`; none where no figure can stand there. `brightest` is the
/// power of the first path, `brightest.relative_power` and the like its other figures; powers are 0 and the
/// rest null where no path brings light.
[[nodiscard]] std::optional<Figure> ghost_figure(const Ghosts& ghosts, std::string_view path);

/// Paths to suggest where one is misspelt.
[[nodiscard]] std::vector<std::string_view> ghost_paths();

} // namespace lightledger::analysis
