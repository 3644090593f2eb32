#pragma once

#include "reference/launch.hpp"
#include "reference/random.hpp"
#include "reference/random_assembly.hpp"

#include <rapidcheck.h>

#include <cmath>
#include <cstdint>
#include <numbers>
#include <vector>

namespace lightledger::reference {

/// A seed of any size; there is nothing simpler about a smaller one.
inline std::uint64_t any_seed() {
  return *rc::gen::noShrink(rc::gen::resize(rc::kNominalSize, rc::gen::arbitrary<std::uint64_t>()));
}

/// Rays of a field through random points of the disc of launch.
inline std::vector<Ray> random_rays(const assembly::Light& light, Dice& dice, int count) {
  std::vector<Ray> rays;
  for (; count > 0; --count) {
    const double r = light.beam.radius * std::sqrt(dice.between(0.0, 1.0));
    const double azimuth = dice.between(0.0, 2.0 * std::numbers::pi);
    rays.push_back(
        launch(light, dice.one_of(light.fields),
               {light.beam.at[0] + r * std::cos(azimuth), light.beam.at[1] + r * std::sin(azimuth)}));
  }
  return rays;
}

} // namespace lightledger::reference
