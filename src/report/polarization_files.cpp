#include "csv.hpp"
#include "figures.hpp"

#include <lightledger/report/chart.hpp>
#include <lightledger/report/picture.hpp>
#include <lightledger/report/polarization.hpp>

#include <fmt/format.h>

#include <array>
#include <cmath>
#include <limits>

namespace lightledger::report {
namespace {

using analysis::Against;
using analysis::Polarization;
using analysis::PolarizationRow;
using analysis::PupilMap;
using assembly::Assembly;

struct MapQuantity {
  const char* name; ///< of the column and of the file
  const char* title;
  const char* quantity;
  const char* unit;
  Scale scale;
  std::optional<double> (*value)(const PupilMap::Point&);
};

using Point = PupilMap::Point;

/// An axis means little where what it belongs to is rounding.
std::optional<double> axis_of(double size, double least, std::optional<double> axis) {
  return size > least ? axis : std::nullopt;
}

const std::array<MapQuantity, 5> quantities{
    {{"diattenuation", "Diattenuation", "diattenuation", "", Scale::linear,
      [](const Point& p) { return std::optional(p.diattenuation); }},
     {"diattenuation_axis_deg", "Axis of diattenuation", "azimuth, double-pole basis", "deg", Scale::cyclic,
      [](const Point& p) { return axis_of(p.diattenuation, 1e-12, p.diattenuation_axis_deg); }},
     {"retardance_deg", "Retardance", "retardance", "deg", Scale::linear,
      [](const Point& p) { return p.retardance_deg; }},
     {"retardance_axis_deg", "Fast axis", "azimuth, double-pole basis", "deg", Scale::cyclic,
      [](const Point& p) { return axis_of(p.retardance_deg.value_or(0.0), 1e-9, p.retardance_axis_deg); }},
     {"cross_leakage", "Cross leakage", "cross leakage", "", Scale::linear,
      [](const Point& p) { return p.cross_leakage; }}}};

std::string field_name(const Assembly& assembly, std::size_t field) {
  return assembly.light.fields[field].name.value_or(std::to_string(field + 1));
}

std::string title_of(const Assembly& assembly, const PupilMap& map, const MapQuantity& quantity) {
  const std::string field =
      assembly.light.fields.size() > 1 ? fmt::format(", field {}", field_name(assembly, map.field)) : "";
  return fmt::format("{}, stations 1 to {}, {} nm{}", quantity.title, assembly.stations.size() - 1,
                     plain(map.wavelength_nm), field);
}

MapPicture picture(const Assembly& assembly, const PupilMap& map, const MapQuantity& quantity) {
  MapPicture picture{title_of(assembly, map, quantity),
                     quantity.quantity,
                     quantity.unit,
                     "pupil x, mm",
                     "pupil y, mm",
                     map.x_from,
                     map.x_to,
                     map.y_from,
                     map.y_to,
                     map.columns,
                     map.rows,
                     {},
                     quantity.scale};
  for (const auto& point : map.points) {
    const auto value = point ? quantity.value(*point) : std::nullopt;
    picture.values.push_back(value.value_or(std::numeric_limits<double>::quiet_NaN()));
  }
  return picture;
}

bool has_values(const PupilMap& map, const MapQuantity& quantity) {
  for (const auto& point : map.points)
    if (point && quantity.value(*point))
      return true;
  return false;
}

void add_pictures(const Assembly& assembly, const PupilMap& map, std::vector<NamedFile>& files) {
  const std::string prefix =
      assembly.light.fields.size() > 1 ? fmt::format("field-{}-", map.field + 1) : std::string();
  for (const MapQuantity& quantity : quantities)
    if (has_values(map, quantity))
      files.push_back(
          {fmt::format("{}{}.png", prefix, quantity.name), png(picture(assembly, map, quantity))});
}

std::string maps_csv(const Assembly& assembly, const std::vector<PupilMap>& maps) {
  Csv csv;
  for (const char* heading : {"field", "wavelength_nm", "pupil_x_mm", "pupil_y_mm", "transmittance"})
    csv.cell(heading);
  for (const MapQuantity& quantity : quantities)
    csv.cell(quantity.name);
  csv.end_row();
  const auto centre = [](double from, double to, std::size_t cell, std::size_t cells) {
    return from + (to - from) * (static_cast<double>(cell) + 0.5) / static_cast<double>(cells);
  };
  for (const PupilMap& map : maps)
    for (std::size_t i = 0; i < map.points.size(); ++i) {
      if (!map.points[i])
        continue;
      csv.cell(field_name(assembly, map.field)).cell(map.wavelength_nm);
      csv.cell(centre(map.x_from, map.x_to, i % map.columns, map.columns));
      csv.cell(centre(map.y_from, map.y_to, i / map.columns, map.rows));
      csv.cell(map.points[i]->transmittance);
      for (const MapQuantity& quantity : quantities)
        csv.cell(quantity.value(*map.points[i]));
      csv.end_row();
    }
  return csv.text();
}

ChartSeries series(const analysis::PolarizationTable& table, const char* name,
                   std::optional<double> PolarizationRow::*figure) {
  ChartSeries line{name, {}, {}};
  for (const PolarizationRow& row : table.rows) {
    line.x.push_back(row.at);
    line.y.push_back((row.*figure).value_or(std::numeric_limits<double>::quiet_NaN()));
  }
  return line;
}

ChartAxis place_axis(const Assembly& assembly, Against against) {
  if (against == Against::wavelength)
    return {"wavelength", "nm"};
  return {"field", assembly.light.object_distance ? "mm" : "deg"};
}

LineChart chart(const Assembly& assembly, const analysis::PolarizationTable& table, const char* title,
                ChartAxis y, std::vector<ChartSeries> lines) {
  const ChartAxis x = place_axis(assembly, table.against);
  return {.title = title,
          .description = fmt::format("{} of all light at the detector against the {}.", title, x.title),
          .x = x,
          .y = std::move(y),
          .series = std::move(lines),
          .marks_x = {},
          .marks_y = {}};
}

void add_table(const Assembly& assembly, const Polarization& polarization, std::vector<NamedFile>& files) {
  const analysis::PolarizationTable& table = polarization.table;
  if (table.against == Against::nothing)
    return;
  const char* const against = table.against == Against::wavelength ? "wavelength" : "angle";
  using Row = PolarizationRow;
  files.push_back({fmt::format("against-{}.csv", against), polarization_csv(polarization)});
  files.push_back({fmt::format("against-{}-angles.svg", against),
                   svg(chart(assembly, table, "Azimuth, ellipticity and retardance", {"angle", "deg"},
                             {series(table, "azimuth", &Row::azimuth_deg),
                              series(table, "ellipticity", &Row::ellipticity_deg),
                              series(table, "retardance", &Row::retardance_deg)}))});
  files.push_back(
      {fmt::format("against-{}-fractions.svg", against),
       svg(chart(assembly, table, "Degree of polarization and diattenuation", {"fraction", ""},
                 {series(table, "DoP", &Row::dop), series(table, "diattenuation", &Row::diattenuation)}))});
}

} // namespace

std::vector<NamedFile> polarization_files(const Assembly& assembly, const Polarization& polarization) {
  std::vector<NamedFile> files;
  for (const PupilMap& map : polarization.maps)
    add_pictures(assembly, map, files);
  if (!polarization.maps.empty())
    files.push_back({"pupil.csv", maps_csv(assembly, polarization.maps)});
  add_table(assembly, polarization, files);
  return files;
}

} // namespace lightledger::report
