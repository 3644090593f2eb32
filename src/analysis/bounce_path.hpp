#pragma once

#include <lightledger/trace/routes.hpp>

#include <optional>
#include <string>
#include <vector>

namespace lightledger::analysis {

/// The path to the detector that bounces where the names say, in their order, and goes as intended elsewhere;
/// none where the routes hold no such path.
[[nodiscard]] std::optional<trace::Path> path_of_bounces(const assembly::Assembly& assembly,
                                                         const trace::Routes& routes,
                                                         const std::vector<std::string>& bounces);

} // namespace lightledger::analysis
