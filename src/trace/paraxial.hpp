#pragma once

#include <lightledger/assembly/assembly.hpp>

#include <optional>

namespace lightledger::trace {

/// The paraxial ray from the axial object point at the first wavelength, along the folded axis: height y and
/// reduced slope ω = n u (Smith, Modern Optical Engineering, 3rd ed., ch. 3). Tilt and shift are ignored.
class ParaxialRay {
public:
  explicit ParaxialRay(const assembly::Assembly& assembly);

  /// Refraction or reflection by the vertex curvature of a station's surface, met from one of its sides.
  void meet(const assembly::Station& station, assembly::Side from);
  /// Refraction or, where it bounces, reflection by a surface.
  void meet(const assembly::Surface& surface, assembly::Side from, bool bounces);
  void advance(double gap) { m_height += gap * m_slope / m_index; }

  /// From the last station met to the image, in mm; none where it is virtual or infinitely far.
  [[nodiscard]] std::optional<double> image_distance() const;
  /// The same, negative where the image is virtual; none where it is infinitely far.
  [[nodiscard]] std::optional<double> signed_image_distance() const;
  [[nodiscard]] const char* why_no_image() const;

private:
  [[nodiscard]] double index(assembly::MediumId medium) const;
  /// Slopes below this are the rounding of the powers added up so far.
  [[nodiscard]] double parallel() const;

  const assembly::Assembly& m_assembly;
  double m_height = 1.0;
  double m_slope = 0.0;
  double m_index = 1.0;
  double m_largest_slope = 0.0;
};

} // namespace lightledger::trace
