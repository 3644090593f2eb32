#pragma once

#include <lightledger/assembly/assembly.hpp>

#include <string>

namespace lightledger::reference {

/// Writes down small trains in tests, one call a station; light of one wavelength starts in air.
class Train {
public:
  explicit Train(double wavelength_nm = 550.0);

  /// Adds a medium of constant index.
  assembly::MediumId medium(double n, double kappa = 0.0);

  Train& refract(const assembly::Shape& shape, assembly::MediumId into, assembly::Gap gap = 0.0);
  Train& reflect(const assembly::Shape& shape, assembly::MediumId backing, assembly::Gap gap = 0.0);
  Train& stop(assembly::Gap gap = 0.0);
  Train& element(const assembly::Effect& effect, assembly::Gap gap = 0.0);
  /// Meets the surface of an earlier station again, where the axis comes back to it.
  Train& again(std::size_t station, assembly::Act act, assembly::Gap gap = 0.0);
  Train& detect();

  /// The surface and the station written last.
  assembly::Surface& surface() { return assembly.surfaces.back(); }
  assembly::Station& station() { return assembly.stations.back(); }
  /// Tilts the surface written last.
  Train& tilt(double a, double b, double c);
  /// Puts layers on the surface written last.
  Train& coat(const assembly::Layers& layers, assembly::Side substrate);

  assembly::Assembly assembly;

private:
  Train& add(assembly::Surface surface, assembly::Act act, assembly::Gap gap);

  assembly::MediumId m_current = 0;
};

} // namespace lightledger::reference
