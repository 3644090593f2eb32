#pragma once

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/assembly/diagnostics.hpp>
#include <lightledger/trace/progress.hpp>

#include <array>
#include <cstdint>
#include <optional>
#include <string>
#include <vector>

namespace lightledger::analysis {

/// One station's line of the ledger; powers are fractions of what was launched (contract §5, budget).
struct StationBudget {
  struct Incidence {
    double min_deg, mean_deg, max_deg;
  };

  std::string name;
  std::string does;
  double incident = 0.0;
  double onward = 0.0;
  double aside = 0.0;
  double absorbed = 0.0;
  double clipped = 0.0;
  double missed = 0.0;
  double scattered = 0.0;
  double extra = 0.0;
  double bulk = 0.0;
  std::optional<double> transmittance; ///< none where no light arrives inside the clear area
  std::optional<double> pass_s, pass_p;
  std::optional<Incidence> incidence;
};

struct WavelengthBudget {
  double wavelength_nm;
  double delivered; ///< of what was launched at this wavelength
};

struct FieldBudget {
  std::optional<std::string> name;
  std::array<double, 2> at; ///< degrees at infinity, mm at a finite object
  double delivered;         ///< of what was launched from this field
};

enum class Split { none, wavelength, field, both };

/// The ledger of one wavelength or one field, in fractions of what was launched there.
struct SplitBudget {
  std::optional<double> wavelength_nm;   ///< of a wavelength's ledger
  std::optional<std::string> field_name; ///< of a field's, none for an unnamed one
  std::vector<StationBudget> stations;
};

struct Budget {
  double delivered = 0.0;
  std::optional<double> uncertainty; ///< standard error of `delivered`; none for patterns that give none
  std::uint64_t rays = 0;            ///< traced in all
  double closure_error = 0.0;        ///< launched − delivered − the losses of all stations as summed
  std::vector<StationBudget> stations;
  std::vector<WavelengthBudget> by_wavelength;
  std::vector<FieldBudget> by_field;
  std::vector<SplitBudget> ledgers; ///< empty without a split; those of wavelengths first
};

struct BudgetOptions {
  Split split = Split::none;
  int threads = 0; ///< 0: as many as the machine has
  trace::Progress* progress = nullptr;
};

struct BudgetResult {
  std::optional<Budget> budget; ///< none where there are faults
  std::vector<std::string> warnings;
  assembly::Faults faults; ///< of the layout: a focus that is virtual, an axis in a mirror's plane, …
};

/// Traces the train of an assembly with the sampling it asks for and reads the ledger.
[[nodiscard]] BudgetResult budget(const assembly::Assembly& assembly, const BudgetOptions& options = {});

} // namespace lightledger::analysis
