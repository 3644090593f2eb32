// The kernel's own functions against those of the mathematical library, on every instruction set.
// clang-format off
#include "trace/kernel/targets.hpp"

#undef HWY_TARGET_INCLUDE
#define HWY_TARGET_INCLUDE "unit/trace/elementary_test.cpp"
#include <hwy/foreach_target.h>

#include "trace/kernel/complex-inl.hpp"
#include "trace/kernel/vectors-inl.hpp"
// clang-format on

#ifndef LIGHTLEDGER_ELEMENTARY_TEST
#define LIGHTLEDGER_ELEMENTARY_TEST
namespace lightledger::trace {

struct Functions {
  double (*reciprocal)(double);
  double (*reciprocal_root)(double);
  double (*quick_root)(double);
  double (*exponential)(double);
  double (*exponential_minus_one)(double);
  double (*sine)(double);
  double (*cosine)(double);
  double (*sine_of_turns)(double);
  double (*angle)(double);
};

} // namespace lightledger::trace
#endif

HWY_BEFORE_NAMESPACE();
namespace lightledger::trace::HWY_NAMESPACE {

double first(V v) {
  double lanes[width];
  store(lanes, v);
  return lanes[0];
}

double reciprocal_of(double x) {
  return first(reciprocal(set(x)));
}
double reciprocal_root_of(double x) {
  return first(reciprocal_root(set(x)));
}
double quick_root_of(double x) {
  return first(quick_root(set(x)));
}
double exponential_of(double x) {
  return first(exponential(set(x)));
}
double exponential_minus_one_of(double x) {
  return first(exponential_minus_one(set(x)));
}
double sine_of(double x) {
  return first(sine_cosine(set(x)).sine);
}
double cosine_of(double x) {
  return first(sine_cosine(set(x)).cosine);
}
double sine_of_turns_of(double x) {
  return first(sine_cosine_of_turns(set(x)).sine);
}
double angle_of(double x) {
  const double sine = std::sin(x);
  return first(angle(set(sine * sine), set(std::cos(x))));
}

constexpr Functions functions = {&reciprocal_of,  &reciprocal_root_of,       &quick_root_of,
                                 &exponential_of, &exponential_minus_one_of, &sine_of,
                                 &cosine_of,      &sine_of_turns_of,         &angle_of};

} // namespace lightledger::trace::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#if HWY_ONCE

#include <gtest/gtest.h>

#include <numbers>
#include <vector>

namespace lightledger::trace {
namespace {

std::vector<Functions> all() {
  std::vector<Functions> found;
  [[maybe_unused]] const std::int64_t supported = hwy::SupportedTargets();
#if HWY_TARGETS & HWY_AVX3
  if ((supported & HWY_AVX3) != 0)
    found.push_back(N_AVX3::functions);
#endif
#if HWY_TARGETS & HWY_AVX2
  if ((supported & HWY_AVX2) != 0)
    found.push_back(N_AVX2::functions);
#endif
#if HWY_TARGETS & HWY_NEON
  if ((supported & HWY_NEON) != 0)
    found.push_back(N_NEON::functions);
#endif
#if HWY_TARGETS & HWY_SCALAR
  found.push_back(N_SCALAR::functions);
#elif HWY_TARGETS & HWY_EMU128
  found.push_back(N_EMU128::functions);
#endif
  return found;
}

constexpr double ulp = 0x1p-52;

double relative(double found, double expected) {
  return std::abs(found - expected) / std::abs(expected);
}

TEST(Elementary, RootsAndQuotientsAreWithinTwoUnitsInTheLastPlace) {
  for (const Functions& f : all())
    for (double x = 1e-290; x < 1e290; x *= 7.3) {
      ASSERT_LE(relative(f.reciprocal(x), 1.0 / x), 2 * ulp) << x;
      ASSERT_LE(relative(f.reciprocal(-x), -1.0 / x), 2 * ulp) << x;
      ASSERT_LE(relative(f.reciprocal_root(x), 1.0 / std::sqrt(x)), 2 * ulp) << x;
      ASSERT_LE(relative(f.quick_root(x), std::sqrt(x)), 2 * ulp) << x;
    }
}

TEST(Elementary, ExponentialsAreWithinTwoUnitsInTheLastPlace) {
  for (const Functions& f : all())
    for (double x = 1e-12; x < 700.0; x *= 1.01) {
      ASSERT_LE(relative(f.exponential(-x), std::exp(-x)), 2 * ulp) << x;
      ASSERT_LE(relative(f.exponential(x), std::exp(x)), 2 * ulp) << x;
      ASSERT_LE(relative(f.exponential_minus_one(-x), std::expm1(-x)), 2 * ulp) << x;
    }
}

TEST(Elementary, SinesAreWithinOneUnitOfOne) {
  for (const Functions& f : all())
    for (double x = -2000.0; x < 2000.0; x += 0.0371) {
      ASSERT_NEAR(f.sine(x), std::sin(x), ulp) << x;
      ASSERT_NEAR(f.cosine(x), std::cos(x), ulp) << x;
    }
}

TEST(Elementary, SinesOfTurnsAreWithinFourUnitsOfOne) {
  for (const Functions& f : all())
    for (double x = 0.0; x < 1.0; x += 0.000317)
      ASSERT_NEAR(f.sine_of_turns(x), std::sin(2.0 * std::numbers::pi * x), 4 * ulp) << x;
}

TEST(Elementary, AnglesAreWithinFourUnitsInTheLastPlace) {
  for (const Functions& f : all())
    for (double x = 1e-7; x < 0.5 * std::numbers::pi; x += 0.000713)
      ASSERT_LE(relative(f.angle(x), x), 4 * ulp) << x;
}

} // namespace
} // namespace lightledger::trace

#endif
