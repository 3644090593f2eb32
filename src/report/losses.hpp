#pragma once

#include <lightledger/analysis/budget.hpp>
#include <lightledger/analysis/remedy.hpp>

#include <array>
#include <cstddef>
#include <string>
#include <vector>

namespace lightledger::report {

/// One way in which a station can lose light.
struct Loss {
  const char* name;
  double analysis::StationBudget::*power;
};

/// All of them, in the one order in which they are shown everywhere.
inline constexpr std::array<Loss, 7> losses{{{"aside", &analysis::StationBudget::aside},
                                             {"absorbed", &analysis::StationBudget::absorbed},
                                             {"clipped", &analysis::StationBudget::clipped},
                                             {"missed", &analysis::StationBudget::missed},
                                             {"scattered", &analysis::StationBudget::scattered},
                                             {"extra", &analysis::StationBudget::extra},
                                             {"bulk", &analysis::StationBudget::bulk}}};

/// An entry of the ledger: what one station loses in one way.
struct LossEntry {
  std::size_t station; ///< index into the stations
  std::size_t loss;    ///< index into `losses`
  double power;
};

/// The largest entries above zero, largest first, at most `how_many`; ties in the order of the train.
[[nodiscard]] std::vector<LossEntry> largest_losses(const std::vector<analysis::StationBudget>& stations,
                                                    std::size_t how_many);

/// What a station loses in one way, summed over the stations.
[[nodiscard]] double total(const std::vector<analysis::StationBudget>& stations, const Loss& loss);

/// "Largest losses: fold absorbs 8.9 %, filter sends 4.1 % aside." With `emphasis` the first stands out.
[[nodiscard]] std::string describe_losses(const std::vector<analysis::StationBudget>& stations,
                                          bool emphasis);

/// "A coating of R >= 0.97 on fold would bring delivered to 0.8610." Rounded so that it does; empty without
/// remedies.
[[nodiscard]] std::string describe_remedies(const std::vector<analysis::StationBudget>& stations,
                                            const std::vector<analysis::Remedy>& remedies, bool in_decibels);

} // namespace lightledger::report
