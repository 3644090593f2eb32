#pragma once

#include "reference/random.hpp"

#include <lightledger/assembly/assembly.hpp>

#include <vector>

namespace lightledger::reference {

/// The media that random assemblies are made of, by their place in the assembly's list.
struct Shelf {
  std::vector<assembly::MediumId> gases, glasses, films, metals;
};

/// Puts gases, glasses, films and metals of random indices on the assembly's list.
[[nodiscard]] Shelf stock(assembly::Assembly& assembly, Dice& dice, bool lossless);

/// Shapes, openings and coatings for a beam of about `size` mm radius.
[[nodiscard]] assembly::Shape random_shape(Dice& dice, double size);
[[nodiscard]] assembly::Clear random_clear(Dice& dice, double size);
[[nodiscard]] assembly::Coating random_layers(Dice& dice, const Shelf& shelf);
[[nodiscard]] assembly::Coating random_ideal(Dice& dice, bool lossless);
/// Curves on a grid about wavelengths from 450 to 1100 nm, the same for s and p at normal incidence;
/// sometimes with phases that go through many turns.
[[nodiscard]] assembly::Coating random_measured(Dice& dice, const Shelf& shelf, bool lossless);

/// A polarizer (not where all must be lossless), a retarder or a rotator.
[[nodiscard]] assembly::Effect random_element(Dice& dice, bool lossless);

} // namespace lightledger::reference
