#pragma once

#include <lightledger/analysis/coating_curve.hpp>

#include <array>
#include <optional>

namespace lightledger::report {

/// A figure of a coating's row, under the name that JSON, CSV and text give it.
struct CoatingColumn {
  const char* name;
  std::optional<double> (*value)(const analysis::CoatingRow&);
};

/// Fractions of power.
inline constexpr std::array<CoatingColumn, 6> coating_powers{
    {{"Rs", [](const analysis::CoatingRow& row) { return std::optional(row.s.reflectance); }},
     {"Rp", [](const analysis::CoatingRow& row) { return std::optional(row.p.reflectance); }},
     {"Ts", [](const analysis::CoatingRow& row) { return std::optional(row.s.transmittance); }},
     {"Tp", [](const analysis::CoatingRow& row) { return std::optional(row.p.transmittance); }},
     {"As", [](const analysis::CoatingRow& row) { return std::optional(row.s.absorptance); }},
     {"Ap", [](const analysis::CoatingRow& row) { return std::optional(row.p.absorptance); }}}};

inline constexpr std::array<CoatingColumn, 4> coating_phases{
    {{"phase_rs_deg", [](const analysis::CoatingRow& row) { return row.s.phase_r_deg; }},
     {"phase_rp_deg", [](const analysis::CoatingRow& row) { return row.p.phase_r_deg; }},
     {"phase_ts_deg", [](const analysis::CoatingRow& row) { return row.s.phase_t_deg; }},
     {"phase_tp_deg", [](const analysis::CoatingRow& row) { return row.p.phase_t_deg; }}}};

} // namespace lightledger::report
