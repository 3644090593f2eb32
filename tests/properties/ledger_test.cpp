#include "properties/fast.hpp"
#include "properties/rotated.hpp"
#include "reference/media.hpp"
#include "reference/reversal.hpp"
#include "reference/unfolded.hpp"

#include <gtest/gtest.h>
#include <rapidcheck/gtest.h>

#include <algorithm>
#include <cmath>

/// What must hold for the ledger of every assembly, whatever it says.
namespace lightledger::properties {
namespace {

using trace::Entry;
using trace::Ledger;

Ledger total(const Both& both, int threads = 1) {
  return trace::trace(both.train, {.threads = threads}).total;
}

RC_GTEST_PROP(LedgerProperty, Closes, ()) {
  const Both both = prepare(reference::random_assembly(reference::any_seed()));
  RC_ASSERT(std::abs(total(both).closure_error()) < 1e-12);
}

RC_GTEST_PROP(LedgerProperty, HandsFromStationToStationWhatGoesOn, ()) {
  const Both both = prepare(reference::random_assembly(reference::any_seed()));
  const Ledger ledger = total(both);
  for (std::size_t i = 0; i + 1 < ledger.rows.size(); ++i)
    RC_ASSERT(std::abs(ledger.rows[i + 1].incident - (ledger.rows[i].onward - ledger.rows[i].bulk)) < 1e-13);
}

RC_GTEST_PROP(LedgerProperty, KeepsAllPowerOfALosslessTrain, ()) {
  const Both both = prepare(reference::random_assembly(reference::any_seed(), {.lossless = true}));
  const Ledger ledger = total(both);
  double kept = ledger.delivered();
  for (const Entry& row : ledger.rows) {
    RC_ASSERT(row.absorbed >= 0.0);
    RC_ASSERT(row.scattered == 0.0 && row.extra == 0.0 && row.bulk == 0.0 && row.clipped == 0.0);
    kept += row.aside + row.missed;
  }
  RC_ASSERT(std::abs(kept - 1.0) < 1e-12);
}

RC_GTEST_PROP(LedgerProperty, EntersNothingNegative, ()) {
  const Both both = prepare(reference::random_assembly(reference::any_seed()));
  for (const Entry& row : total(both).rows)
    for (const double power : {row.incident, row.missed, row.clipped, row.onward, row.aside, row.absorbed,
                               row.scattered, row.extra, row.bulk})
      RC_ASSERT(power >= 0.0 && power < 1.0 + 1e-12);
}

/// A wrong amplitude shows: the Jones matrix behind a station is made larger by 1e-9.
TEST(LedgerProperty, ClosureErrorShowsAnAmplitudeThatIsOffByOnePartInABillion) {
  assembly::Assembly assembly = reference::random_assembly(3, {.lossless = true});
  const Both both = prepare(assembly);
  reference::Dice dice(4);
  const trace::RayBlock launched = block_of(reference::random_rays(assembly.light, dice, 64));
  const Ledger right = run(both.train, launched).ledger;
  const Ledger wrong = run(both.train, launched, 0, [](std::size_t station, trace::RayBlock& block) {
                         if (station == 0)
                           for (auto& row : block.J)
                             for (double& entry : row)
                               entry *= 1.0 + 1e-9;
                       }).ledger;
  ASSERT_GT(right.rows[0].onward, 0.1);
  EXPECT_LT(std::abs(right.closure_error()), 64e-12);
  EXPECT_NEAR(wrong.closure_error(), -2e-9 * right.rows[0].onward, 64e-12);
}

bool same_bits(const Entry& a, const Entry& b) {
  return a.incident == b.incident && a.missed == b.missed && a.clipped == b.clipped && a.onward == b.onward &&
         a.aside == b.aside && a.absorbed == b.absorbed && a.scattered == b.scattered && a.extra == b.extra &&
         a.bulk == b.bulk && a.inside == b.inside && a.incidence == b.incidence;
}

RC_GTEST_PROP(LedgerProperty, HasTheSameBitsForAnyNumberOfThreads, ()) {
  const Both both = prepare(reference::random_assembly(reference::any_seed()));
  const Ledger one = total(both, 1);
  const Ledger three = total(both, 3);
  RC_ASSERT(std::equal(one.rows.begin(), one.rows.end(), three.rows.begin(), same_bits));
}

RC_GTEST_PROP(LedgerProperty, DoesNotDependOnTheOrderOfFieldsAndWavelengths, ()) {
  const assembly::Assembly assembly = reference::random_assembly(reference::any_seed());
  assembly::Assembly reordered = assembly;
  std::reverse(reordered.light.fields.begin(), reordered.light.fields.end());
  // The first wavelength leads to the focus, so that it stays where it is.
  std::reverse(reordered.light.wavelengths.begin() + 1, reordered.light.wavelengths.end());
  RC_ASSERT(alike(total(prepare(assembly)), total(prepare(reordered)), 1e-14));
}

/// A stop without an aperture halfway in the gap behind a station.
assembly::Assembly with_a_stop_behind(assembly::Assembly assembly, std::size_t station) {
  assembly::Surface stop;
  stop.effect = assembly::Opening{};
  stop.before = reference::medium_behind(assembly, assembly.stations[station],
                                         reference::lay_out(assembly).stations[station].from);
  assembly::Station visit;
  visit.name = "added";
  visit.surface = static_cast<assembly::SurfaceId>(assembly.surfaces.size());
  visit.intended = assembly::Act::pass;
  double& gap = std::get<double>(assembly.stations[station].gap);
  gap *= 0.5;
  visit.gap = gap;
  assembly.surfaces.push_back(stop);
  assembly.stations.insert(assembly.stations.begin() + static_cast<std::ptrdiff_t>(station) + 1, visit);
  return assembly;
}

/// Takes an added stop out of a ledger again: what was absorbed behind it belongs to the same gap.
void merge_added(Ledger& ledger, std::size_t added) {
  ledger.rows[added - 1].bulk += ledger.rows[added].bulk;
  ledger.rows.erase(ledger.rows.begin() + static_cast<std::ptrdiff_t>(added));
}

RC_GTEST_PROP(LedgerProperty, IsUnchangedWhenAGapIsSplit, ()) {
  const std::uint64_t seed = reference::any_seed();
  const assembly::Assembly assembly = reference::random_assembly(seed);
  reference::Dice dice(seed + 1);
  const auto station =
      static_cast<std::size_t>(dice.whole(0, static_cast<int>(assembly.stations.size()) - 2));
  RC_PRE(std::holds_alternative<double>(assembly.stations[station].gap));

  const Both both = prepare(assembly);
  const Ledger whole = total(both);
  Ledger split = total(prepare(with_a_stop_behind(assembly, station)));
  // Ways run backwards absorb nothing, and a ray that misses the next surface has lost nothing on the way
  // there.
  RC_PRE(split.rows[station].backward == 0.0 && split.rows[station + 1].backward == 0.0 &&
         whole.rows[station].backward == 0.0 && whole.rows[station + 1].missed == 0.0);
  merge_added(split, station + 1);
  RC_ASSERT(alike(whole, split, 1e-11));
}

RC_GTEST_PROP(LedgerProperty, IsUnchangedWhenSurfacesMetAgainAreWrittenOut, ()) {
  assembly::Assembly assembly = reference::random_assembly(reference::any_seed(), {.returning = true});
  assembly.light.sampling = assembly::Rings{2, 6};
  const Both both = prepare(assembly);
  const auto written_out = reference::unfolded(*both.assembly, both.bench);
  RC_PRE(written_out.has_value() && textbook(both).left_out == 0);
  RC_ASSERT(alike(total(both), total(prepare(*written_out)), 1e-11));
}

RC_GTEST_PROP(LedgerProperty, IsUnchangedWhenTheBenchIsRotated, ()) {
  const std::uint64_t seed = reference::any_seed();
  assembly::Assembly assembly = reference::random_assembly(seed);
  constexpr int spokes = 8;
  assembly.light.sampling = assembly::Rings{3, spokes};
  const Both both = prepare(assembly);
  RC_PRE(textbook(both).left_out == 0);
  const double by = 360.0 / spokes * reference::Dice(seed + 1).whole(1, spokes - 1);
  RC_ASSERT(alike(total(both), total(prepare(rotated(assembly, by))), 1e-11));
}

/// Helmholtz reciprocity: the reversed path has the transposed matrix, magnets reversed.
RC_GTEST_PROP(Kernel, TransposesTheMatrixOnTheWayBack, ()) {
  const std::uint64_t seed = reference::any_seed();
  const Both both = prepare(reference::random_assembly(seed, {.reversible = true}));
  const reference::Reversed reverse = reference::reversed(*both.assembly, both.bench);
  const Both back = prepare(reverse.assembly);
  const double wavelength = both.assembly->light.wavelengths.front().nm;
  const reference::PolarizationMatrix axes = reverse.entrance.axes.cast<std::complex<double>>();
  const std::size_t last = both.assembly->stations.size() - 2;
  reference::Dice dice(seed + 1);
  for (const reference::Ray& ray : reference::random_rays(both.assembly->light, dice, 8)) {
    const auto there = reference::trace(both.bench, *both.assembly, wavelength, ray);
    if (!there.comparable() || there.steps.size() < last + 2)
      continue;
    const reference::Ray turned = reference::returning(there, reverse.entrance);
    const auto record = reference::trace(back.bench, *back.assembly, wavelength, turned);
    if (!record.comparable() || !reference::same_places(there, record, reverse.entrance))
      continue;
    const trace::RayBlock out = block_of({ray});
    const trace::RayBlock in = block_of({turned});
    const auto forward = polarization_matrix(both.train, out, run(both.train, out).behind.at(last), last);
    const auto backward = polarization_matrix(back.train, in, run(back.train, in).behind.at(last), last);
    RC_ASSERT((axes * backward * axes.adjoint() - forward.transpose()).norm() < 1e-10);
  }
}

} // namespace
} // namespace lightledger::properties
