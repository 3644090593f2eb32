#pragma once

#include <lightledger/analysis/budget.hpp>
#include <lightledger/analysis/ghosts.hpp>
#include <lightledger/analysis/polarization.hpp>
#include <lightledger/assembly/assembly.hpp>
#include <lightledger/assembly/diagnostics.hpp>

#include <optional>
#include <string>
#include <vector>

namespace lightledger::analysis {

/// A requirement held against what the assembly does.
struct Verdict {
  std::string quantity;
  assembly::Sense sense;
  double limit;
  std::optional<double> value;       ///< none where it does not exist, or belongs to an analysis not made
  std::optional<double> uncertainty; ///< standard error of the value; none where it has none
  std::optional<double> margin;      ///< in the quantity's own unit, positive when met
  std::optional<bool> met;           ///< none where it cannot be told
};

/// Margin and verdict of a value. Two standard errors decide whether it can be told; a margin within rounding
/// (1e-12 of the limit, of 1 below it) counts as met.
[[nodiscard]] Verdict judge(const assembly::Requirement& requirement, std::optional<double> value,
                            std::optional<double> uncertainty);

struct Judgement {
  std::vector<Verdict> verdicts; ///< in the order of the file
  std::vector<std::string> warnings;
  assembly::Faults faults; ///< quantities that no analysis knows

  /// Each is known to be met; true where there are none.
  [[nodiscard]] bool all_met() const;
};

/// Holds the requirements of an assembly against its budget and, where one of them asks for it, its ghosts and
/// what happens to polarization. Quantities are paths in the JSON of a command, with stations and fields by
/// name or by index: `budget.delivered`, `budget.stations.fold.incidence_deg.max`,
/// `budget.by_wavelength[1].delivered`, `ghosts.total`, `ghosts.paths[0].by_field.corner.power`,
/// `polarization.detector.cross_leakage`; `delivered` for short.
[[nodiscard]] Judgement judge_all(const assembly::Assembly& assembly, const Budget& budget,
                                  const Polarization* polarization = nullptr,
                                  const Ghosts* ghosts = nullptr);

struct CheckResult {
  std::optional<Judgement> judgement; ///< none where there are faults
  std::vector<std::string> warnings;  ///< of the budget and of the judgement
  assembly::Faults faults;
};

/// Lays the assembly out, traces it as far as its requirements need it, and judges them.
[[nodiscard]] CheckResult check(const assembly::Assembly& assembly, const BudgetOptions& options = {});

} // namespace lightledger::analysis
