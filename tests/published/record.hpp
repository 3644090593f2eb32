#pragma once

#include <complex>
#include <string>
#include <string_view>

/// Checks against published values. Each is made and entered in one call:
///
///   TEST(PublishedInterfaces, GlassReflectsFourPerCent) {
///     Sheet sheet{"F01", "Normal incidence on glass", "E. Hecht, Optics, §4.6.2"};
///     sheet.recalled("R", "0.04", std::norm(r_s));
///   }
///
/// When all tests of the program ran and passed, docs/validation.md is written from what they entered, a
/// section for each sheet, in the order of the ids. A published value is given as text, just as it stands in
/// its source, for its digits set the tolerance: "0.04", "1.5e-3", "14 %" (then `ours` is a fraction), "56
/// deg 40'" (then `ours` is in degrees).
namespace lightledger::published {

/// What a check may add to the value that it is given.
struct More {
  /// The same value from an independent computation, to more digits; checked besides, as `derived` does.
  std::string_view computed{};
  /// Tolerance against the published value, in its unit, in place of half a unit of its last digit.
  double within = 0.0;
  /// Relative tolerance against the computed value, or half a unit of its last digit where that is more; a
  /// computed value of up to four digits is meant exactly.
  double relative = 1e-10;
};

/// The checks of one case. An id is the letters of a chapter (see validation.cpp) and a number: F01, RT-03.
/// Several tests may fill one sheet; they give the same title and source.
class Sheet {
public:
  Sheet(std::string id, std::string title, std::string source);

  /// A value that was read in the source.
  Sheet& printed(std::string_view what, std::string_view value, double ours, More more = {});
  /// A value recalled from the source, which was not at hand.
  Sheet& recalled(std::string_view what, std::string_view value, double ours, More more = {});
  /// A value that the source does not print, computed independently from its formula.
  Sheet& derived(std::string_view what, std::string_view value, double ours, More more = {});
  /// An identity: `ours` is `value` but for rounding, of which `within` is an absolute bound.
  Sheet& exactly(std::string_view what, double value, std::complex<double> ours, double within = 1e-14);

private:
  void check_published(std::string_view what, std::string_view value, std::string_view origin, double ours,
                       More more);

  std::string m_id, m_title, m_source;
};

} // namespace lightledger::published
