#include <lightledger/trace/curve.hpp>

#include <algorithm>
#include <cmath>
#include <limits>
#include <numbers>

namespace lightledger::trace {
namespace {

using assembly::Measured;

CurvePoint seen(const Measured& measured, const Measured::Point& point, double x, bool from_back) {
  const Measured::Powers& reflect = from_back ? point.reflect_back : point.reflect;
  Measured::Phases phases = point.phases;
  if (from_back && measured.has_phases) {
    phases.rs = std::numbers::pi + 2.0 * phases.ts - phases.rs;
    phases.rp = std::numbers::pi + 2.0 * phases.tp - phases.rp;
  }
  return {x,         reflect.s, reflect.p, point.transmit.s, point.transmit.p,
          phases.rs, phases.rp, phases.ts, phases.tp};
}

/// Takes each phase of a point to the turn nearest to that of its neighbour, so that between them it goes the
/// short way.
void unwrap(const CurvePoint& neighbour, CurvePoint& point) {
  for (const auto phase :
       {&CurvePoint::phase_rs, &CurvePoint::phase_rp, &CurvePoint::phase_ts, &CurvePoint::phase_tp})
    point.*phase = neighbour.*phase + std::remainder(point.*phase - neighbour.*phase, 2.0 * std::numbers::pi);
}

/// The point at `low.x` with all its values between those of two points.
CurvePoint mix(const CurvePoint& low, const CurvePoint& high, double share) {
  CurvePoint mixed = low;
  for (const auto value :
       {&CurvePoint::reflect_s, &CurvePoint::reflect_p, &CurvePoint::transmit_s, &CurvePoint::transmit_p,
        &CurvePoint::phase_rs, &CurvePoint::phase_rp, &CurvePoint::phase_ts, &CurvePoint::phase_tp})
    mixed.*value = std::lerp(low.*value, high.*value, share);
  return mixed;
}

CurvePoint between(const CurvePoint& low, CurvePoint high, double share) {
  unwrap(low, high);
  return mix(low, high, share);
}

/// Over the angle, at a wavelength between two of the file's.
std::vector<CurvePoint> over_angle(const Measured& measured, double wavelength_nm, bool from_back) {
  const auto& wavelengths = measured.wavelengths_nm;
  const auto above = std::clamp<std::ptrdiff_t>(
      std::upper_bound(wavelengths.begin(), wavelengths.end(), wavelength_nm) - wavelengths.begin(), 1,
      std::max<std::ptrdiff_t>(std::ssize(wavelengths) - 1, 1));
  const auto high = static_cast<std::size_t>(std::min(above, std::ssize(wavelengths) - 1));
  const auto low = static_cast<std::size_t>(above - 1);
  const double step = wavelengths[high] - wavelengths[low];
  const double share = step > 0.0 ? std::clamp((wavelength_nm - wavelengths[low]) / step, 0.0, 1.0) : 0.0;
  const std::size_t angles = measured.angles_deg.size();
  std::vector<CurvePoint> points;
  for (std::size_t a = 0; a < angles; ++a) {
    const double x = measured.angles_deg[a];
    points.push_back(between(seen(measured, measured.points[low * angles + a], x, from_back),
                             seen(measured, measured.points[high * angles + a], x, from_back), share));
  }
  return points;
}

std::vector<CurvePoint> over_wavelength(const Measured& measured, bool from_back) {
  std::vector<CurvePoint> points;
  for (std::size_t w = 0; w < measured.wavelengths_nm.size(); ++w)
    points.push_back(seen(measured, measured.points[w], measured.wavelengths_nm[w], from_back));
  return points;
}

} // namespace

double angle_on_curve(double alpha_squared, double index) {
  const double sine = std::sqrt(alpha_squared) / index;
  return sine < 1.0 ? std::asin(sine) * (180.0 / std::numbers::pi) : std::numeric_limits<double>::max();
}

double wavelength_on_curve(double alpha_squared, double shift_index, double wavelength_nm) {
  const double cos_squared = 1.0 - alpha_squared / (shift_index * shift_index);
  return cos_squared > 0.0 ? wavelength_nm / std::sqrt(cos_squared) : std::numeric_limits<double>::max();
}

bool outside(std::span<const CurvePoint> points, double x) {
  constexpr double rounding = 1e-9; // degrees or nm
  return x < points.front().x - rounding || x > points.back().x + rounding;
}

CurvePoint interpolate(std::span<const CurvePoint> points, double x) {
  const auto above = std::ranges::upper_bound(points, x, {}, &CurvePoint::x);
  if (above == points.begin())
    return points.front();
  if (above == points.end())
    return points.back();
  const CurvePoint& low = *std::prev(above);
  return mix(low, *above, (x - low.x) / (above->x - low.x));
}

std::vector<CurvePoint> curve(const Measured& measured, double wavelength_nm, bool from_back) {
  std::vector<CurvePoint> points = measured.shift_index ? over_wavelength(measured, from_back)
                                                        : over_angle(measured, wavelength_nm, from_back);
  for (std::size_t i = 1; i < points.size(); ++i)
    unwrap(points[i - 1], points[i]);
  return points;
}

} // namespace lightledger::trace
