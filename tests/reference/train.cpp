#include "reference/train.hpp"

#include "reference/bench.hpp"
#include "reference/media.hpp"

namespace lightledger::reference {

using assembly::Act;
using assembly::Gap;
using assembly::MediumId;
using assembly::Shape;
using assembly::Surface;

Train::Train(double wavelength_nm) {
  assembly.light.wavelengths = {{wavelength_nm, 1.0}};
  assembly.light.medium = medium(1.0);
}

MediumId Train::medium(double n, double kappa) {
  optics::Medium medium;
  medium.name = "medium " + std::to_string(assembly.media.size());
  medium.dispersion = optics::ConstantIndex{n, kappa};
  assembly.media.push_back(medium);
  return static_cast<MediumId>(assembly.media.size() - 1);
}

Train& Train::add(Surface surface, Act act, Gap gap) {
  surface.before = m_current;
  assembly.surfaces.push_back(surface);
  assembly::Station station;
  station.name = "station " + std::to_string(assembly.stations.size());
  station.surface = static_cast<assembly::SurfaceId>(assembly.surfaces.size() - 1);
  station.intended = act;
  station.gap = gap;
  assembly.stations.push_back(station);
  return *this;
}

Train& Train::refract(const Shape& shape, MediumId into, Gap gap) {
  Surface surface;
  surface.shape = shape;
  surface.effect = assembly::Interface{};
  surface.beyond = into;
  add(surface, Act::pass, gap);
  m_current = into;
  return *this;
}

Train& Train::reflect(const Shape& shape, MediumId backing, Gap gap) {
  Surface surface;
  surface.shape = shape;
  surface.effect = assembly::Interface{};
  surface.beyond = backing;
  return add(surface, Act::bounce, gap);
}

Train& Train::stop(Gap gap) {
  Surface surface;
  surface.effect = assembly::Opening{};
  return add(surface, Act::pass, gap);
}

Train& Train::element(const assembly::Effect& effect, Gap gap) {
  Surface surface;
  surface.effect = effect;
  return add(surface, Act::pass, gap);
}

Train& Train::again(std::size_t station, Act act, Gap gap) {
  assembly::Station visit = assembly.stations.at(station);
  visit.name += " again";
  visit.intended = act;
  visit.gap = gap;
  visit.turn_deg = {};
  assembly.stations.back().gap = assembly::UpToSurface{};
  assembly.stations.push_back(visit);
  m_current = medium_behind(assembly, visit, lay_out(assembly).stations.back().from);
  return *this;
}

Train& Train::detect() {
  Surface surface;
  surface.effect = assembly::Sensor{};
  return add(surface, Act::detect, 0.0);
}

Train& Train::tilt(double a, double b, double c) {
  surface().tilt_deg = {a, b, c};
  return *this;
}

Train& Train::coat(const assembly::Layers& layers, assembly::Side substrate) {
  surface().coating =
      assembly::CoatingUse{static_cast<assembly::CoatingId>(assembly.coatings.size()), substrate};
  assembly.coatings.push_back({"coating " + std::to_string(assembly.coatings.size()), layers});
  return *this;
}

} // namespace lightledger::reference
