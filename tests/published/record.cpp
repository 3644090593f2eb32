#include "published/record.hpp"

#include "published/quoted.hpp"
#include "published/validation.hpp"

#include <fmt/format.h>
#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <utility>

namespace lightledger::published {
namespace {

std::string this_test() {
  const testing::TestInfo* test = testing::UnitTest::GetInstance()->current_test_info();
  return test == nullptr ? "" : fmt::format("{}.{}", test->test_suite_name(), test->name());
}

/// Six digits, on which all machines agree: a tie is decided after eleven, where rounding errors are gone.
std::string rounded(double value) {
  return fmt::format("{:.6g}", std::stod(fmt::format("{:.11g}", value)));
}

/// In the unit in which `text` is printed.
std::string rounded_like(std::string_view text, double value) {
  const double scale = quoted(text).scale;
  return rounded(value * scale) + (scale == 1.0 ? "" : " %");
}

/// Values of few digits are meant exactly; of others the last digit is rounded.
void expect_computed(std::string_view text, double ours, double relative) {
  constexpr int few = 4;
  const Quoted computed = quoted(text);
  const double rounding = computed.digits <= few ? 0.0 : computed.half_unit;
  EXPECT_NEAR(ours * computed.scale, computed.value, std::max(relative * std::abs(computed.value), rounding));
}

} // namespace

Sheet::Sheet(std::string id, std::string title, std::string source)
    : m_id(std::move(id)), m_title(std::move(title)), m_source(std::move(source)) {}

Sheet& Sheet::printed(std::string_view what, std::string_view value, double ours, More more) {
  check_published(what, value, "print", ours, more);
  return *this;
}

Sheet& Sheet::recalled(std::string_view what, std::string_view value, double ours, More more) {
  check_published(what, value, "memory", ours, more);
  return *this;
}

Sheet& Sheet::derived(std::string_view what, std::string_view value, double ours, More more) {
  const testing::ScopedTrace trace{__FILE__, __LINE__, fmt::format("{}: {}", m_id, what)};
  expect_computed(value, ours, more.relative);
  enter(m_id, m_title, m_source,
        {std::string{what}, "", "formula", std::string{value}, rounded_like(value, ours),
         fmt::format("{:.2g} of it", more.relative), this_test()});
  return *this;
}

Sheet& Sheet::exactly(std::string_view what, double value, std::complex<double> ours, double within) {
  EXPECT_LE(std::abs(ours - value), within) << m_id << ": " << what << " is " << ours << ", not " << value;
  enter(m_id, m_title, m_source,
        {std::string{what}, rounded(value), "identity", "", rounded(value), fmt::format("{:.2g}", within),
         this_test()});
  return *this;
}

void Sheet::check_published(std::string_view what, std::string_view value, std::string_view origin,
                            double ours, More more) {
  const testing::ScopedTrace trace{__FILE__, __LINE__, fmt::format("{}: {}", m_id, what)};
  const Quoted published = quoted(value);
  const double within = more.within > 0.0 ? more.within : published.half_unit;
  EXPECT_NEAR(ours * published.scale, published.value, within);
  if (!more.computed.empty())
    expect_computed(more.computed, ours, more.relative);
  enter(m_id, m_title, m_source,
        {std::string{what}, std::string{value}, std::string{origin}, std::string{more.computed},
         rounded_like(value, ours), fmt::format("{:.2g}", within), this_test()});
}

} // namespace lightledger::published
