#include "polarization_quantity.hpp"

#include <fmt/format.h>

#include <array>
#include <utility>

namespace lightledger::analysis {
namespace {

using Figures = std::vector<PolarizationFigure>;

template <class Object>
struct Key {
  const char* name;
  std::optional<double> Object::*member;
};

constexpr std::array<Key<DetectorFigures>, 13> detector_keys{
    {{"dop", &DetectorFigures::dop},
     {"azimuth_deg", &DetectorFigures::azimuth_deg},
     {"ellipticity_deg", &DetectorFigures::ellipticity_deg},
     {"depolarization_index", &DetectorFigures::depolarization_index},
     {"depolarization", &DetectorFigures::depolarization},
     {"diattenuation", &DetectorFigures::diattenuation},
     {"polarizance", &DetectorFigures::polarizance},
     {"retardance_deg", &DetectorFigures::retardance_deg},
     {"rotation_deg", &DetectorFigures::rotation_deg},
     {"linear_extinction", &DetectorFigures::linear_extinction},
     {"extinction", &DetectorFigures::extinction},
     {"cross_leakage", &DetectorFigures::cross_leakage},
     {"coherent_share", &DetectorFigures::coherent_share}}};

constexpr std::array<Key<ChiefStation>, 5> station_keys{{{"dop", &ChiefStation::dop},
                                                         {"azimuth_deg", &ChiefStation::azimuth_deg},
                                                         {"ellipticity_deg", &ChiefStation::ellipticity_deg},
                                                         {"diattenuation", &ChiefStation::diattenuation},
                                                         {"retardance_deg", &ChiefStation::retardance_deg}}};

constexpr std::array<Key<AttributionFigures>, 4> attribution_keys{
    {{"diattenuation", &AttributionFigures::diattenuation},
     {"retardance_deg", &AttributionFigures::retardance_deg},
     {"dop_loss", &AttributionFigures::dop_loss},
     {"cross_leakage", &AttributionFigures::cross_leakage}}};

/// A ratio exists and knows no bounds where there is light but no ratio.
bool is_boundless(const DetectorFigures& detector, const Key<DetectorFigures>& key) {
  const bool ratio =
      key.member == &DetectorFigures::extinction || key.member == &DetectorFigures::linear_extinction;
  return ratio && detector.stokes[0] > 0.0 && !(detector.*key.member);
}

void add_detector(const Polarization& polarization, Figures& figures) {
  const bool estimated = polarization.uncertainty.has_value();
  const auto error = [&](double value) { return estimated ? std::optional(value) : std::nullopt; };
  const DetectorFigures& detector = polarization.detector;
  for (const auto& key : detector_keys)
    figures.push_back({fmt::format("detector.{}", key.name), detector.*key.member,
                       polarization.error.*key.member, is_boundless(detector, key)});
  for (std::size_t row = 0; row < 4; ++row) {
    figures.push_back({fmt::format("detector.stokes[{}]", row), detector.stokes[row],
                       error(polarization.error.stokes[row])});
    for (std::size_t column = 0; column < 4; ++column)
      figures.push_back({fmt::format("detector.mueller[{}][{}]", row, column), detector.mueller[row][column],
                         error(polarization.error.mueller[row][column])});
  }
}

void add_station(const std::string& item, const ChiefStation& station, Figures& figures) {
  for (const auto& key : station_keys)
    figures.push_back({fmt::format("chief.stations{}.{}", item, key.name), station.*key.member, {}});
  for (std::size_t i = 0; i < station.stokes.size(); ++i)
    figures.push_back({fmt::format("chief.stations{}.stokes[{}]", item, i), station.stokes[i], {}});
}

void add_chief(const ChiefRay& chief, Figures& figures) {
  figures.push_back({"chief.diattenuation", chief.diattenuation, {}});
  figures.push_back({"chief.retardance_deg", chief.retardance_deg, {}});
  figures.push_back({"chief.rotation_deg", chief.rotation_deg, {}});
  for (std::size_t row = 0; row < 4; ++row)
    for (std::size_t column = 0; column < 4; ++column)
      figures.push_back({fmt::format("chief.mueller[{}][{}]", row, column), chief.mueller[row][column], {}});
}

/// `[3]` or `.name`.
std::string item(const std::string& name, std::size_t index, bool by_name) {
  return by_name ? "." + name : fmt::format("[{}]", index);
}

void add_attribution(const char* list, const std::vector<Attribution>& attributions, bool by_name,
                     Figures& figures) {
  for (std::size_t i = 0; i < attributions.size(); ++i)
    for (const auto& key : attribution_keys)
      figures.push_back({fmt::format("{}{}.{}", list, item(attributions[i].name, i, by_name), key.name),
                         attributions[i].value.*key.member, attributions[i].error.*key.member});
}

} // namespace

std::vector<PolarizationFigure> polarization_figures(const Polarization& polarization) {
  Figures figures;
  add_detector(polarization, figures);
  if (polarization.chief)
    add_chief(*polarization.chief, figures);
  for (const bool by_name : {false, true}) {
    if (polarization.chief)
      for (std::size_t i = 0; i < polarization.chief->stations.size(); ++i) {
        const ChiefStation& station = polarization.chief->stations[i];
        add_station(item(station.name, i, by_name), station, figures);
      }
    add_attribution("attribution", polarization.attribution, by_name, figures);
    add_attribution("attribution_by_element", polarization.by_element, by_name, figures);
    add_attribution("attribution_by_coating", polarization.by_coating, by_name, figures);
  }
  return figures;
}

} // namespace lightledger::analysis
