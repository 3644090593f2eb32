#pragma once

#include <lightledger/assembly/assembly.hpp>

#include <string>
#include <vector>

namespace lightledger::analysis {

/// Stations that are made neutral together to learn what they do, the detector never among them.
struct NeutralSet {
  std::string name;
  std::vector<std::size_t> stations; ///< ascending
};

/// Each station alone.
[[nodiscard]] std::vector<NeutralSet> station_sets(const assembly::Assembly& assembly);

/// Each piece of glass: the stations from where the light leaves a gas to where it comes back into one.
[[nodiscard]] std::vector<NeutralSet> element_sets(const assembly::Assembly& assembly);

/// All stations with the same coating; `bare` are the interfaces without one.
[[nodiscard]] std::vector<NeutralSet> coating_sets(const assembly::Assembly& assembly);

} // namespace lightledger::analysis
