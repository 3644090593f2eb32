#include "support/walk.hpp"

#include <lightledger/trace/tracer.hpp>

#include <gtest/gtest.h>

#include <cmath>
#include <string>
#include <vector>

namespace lightledger::trace {
namespace {

struct Beam {
  const char* what;
  std::string text;
};

/// Beams that pass freely, are clipped on all sides, on one side, and by a hole; polarized folds and coated
/// lenses.
std::vector<Beam> beams() {
  const std::string light = "light: {wavelengths: [550], polarization: {linear: 30}, fields: [[0, 1]], "
                            "rays: {pattern: scattered, count: 4096}, beam: ";
  const std::string lens = "- {name: front, radius: 30, into: fused-silica, gap: 4}\n"
                           "- {name: rear, radius: -40, into: air, gap: 20}\n";
  const std::string end = "- {name: end, does: detect}\n";
  return {
      {"free", light + "{radius: 6}}\ntrain:\n" + lens + end},
      {"clipped all round",
       light + "{radius: 6}}\ntrain:\n- {name: iris, does: stop, clear: {diameter: 10}, gap: 5}\n" + lens +
           end},
      {"clipped on one side",
       light + "{radius: 6}}\ntrain:\n" + lens +
           "- {name: knife, does: stop, clear: {width: 4, height: 9, at: [1, 2]}, gap: 5}\n" + end},
      {"Gaussian about an obscuration", light +
                                            "{radius: 6, gaussian: 3}}\ntrain:\n- {name: spider, does: stop, "
                                            "clear: {hole: {diameter: 3}}, gap: 5}\n" +
                                            lens + end},
      {"folded",
       light + "{radius: 6}}\ntrain:\n" + lens +
           "- {name: fold, does: reflect, tilt: [55, 10, 0], backing: Al, clear: {diameter: 11}, gap: 9}\n" +
           end}};
}

TEST(Sampling, TheStandardErrorHoldsOverTwoHundredSetsOfShifts) {
  constexpr int sets = 200;
  for (const Beam& beam : beams()) {
    support::Ready train = support::ready(beam.text);
    train.assembly->light.sampling = assembly::Scattered{std::uint64_t{1} << 20};
    const double converged = trace(train.train).total.delivered();
    train.assembly->light.sampling = assembly::Scattered{4096};
    int within = 0;
    for (std::uint64_t shifts = 1; shifts <= sets; ++shifts) {
      const Traced traced = trace(train.train, {.shifts = shifts});
      within += std::abs(traced.total.delivered() - converged) <= 3.0 * *traced.standard_error ? 1 : 0;
    }
    EXPECT_GE(within, sets * 99 / 100) << beam.what;
  }
}

} // namespace
} // namespace lightledger::trace
