#include "pixels.hpp"

#include <algorithm>
#include <cmath>
#include <variant>

namespace lightledger::analysis {
namespace {

constexpr std::uint64_t fewest_rays = 100;
/// Powers are summed as whole numbers of this many to the total, so that their order does not matter.
constexpr double quanta = 0x1p52;

struct HalfExtents {
  std::optional<std::array<double, 2>> operator()(const assembly::Clear::Unlimited&) const { return {}; }
  std::optional<std::array<double, 2>> operator()(const assembly::Clear::Disc& disc) const {
    return std::array{disc.radius, disc.radius};
  }
  std::optional<std::array<double, 2>> operator()(const assembly::Clear::Rectangle& rectangle) const {
    return std::array{rectangle.half_width, rectangle.half_height};
  }
  std::optional<std::array<double, 2>> operator()(const assembly::Clear::Ellipse& ellipse) const {
    return std::array{ellipse.semi_x, ellipse.semi_y};
  }
};

/// Light on one pixel, or on a square of them.
struct Lit {
  std::uint64_t column, row;
  std::uint64_t quanta, rays;
};

std::uint64_t cell(double place, double from, double pitch, std::uint64_t count) {
  const double number = std::floor((place - from) / pitch);
  return static_cast<std::uint64_t>(std::clamp(number, 0.0, static_cast<double>(count - 1)));
}

/// Adds up what falls on the same pixels.
void gather(std::vector<Lit>& lit) {
  std::ranges::sort(
      lit, [](const Lit& a, const Lit& b) { return a.row != b.row ? a.row < b.row : a.column < b.column; });
  std::size_t last = 0;
  for (std::size_t i = 1; i < lit.size(); ++i) {
    if (lit[i].column == lit[last].column && lit[i].row == lit[last].row) {
      lit[last].quanta += lit[i].quanta;
      lit[last].rays += lit[i].rays;
    } else {
      lit[++last] = lit[i];
    }
  }
  lit.resize(lit.empty() ? 0 : last + 1);
}

void coarsen(std::vector<Lit>& lit) {
  for (Lit& one : lit) {
    one.column /= 2;
    one.row /= 2;
  }
  gather(lit);
}

} // namespace

std::optional<PixelGrid> pixel_grid(const assembly::Assembly& assembly) {
  const assembly::Surface& surface = assembly.surfaces[assembly.stations.back().surface];
  const auto* sensor = std::get_if<assembly::Sensor>(&surface.effect);
  const auto half = std::visit(HalfExtents{}, surface.clear.opening);
  if (sensor == nullptr || !sensor->pixels || !half)
    return std::nullopt;
  const auto [columns, rows] = *sensor->pixels;
  const auto [half_x, half_y] = *half;
  return PixelGrid{surface.clear.at[0] - half_x,
                   surface.clear.at[1] - half_y,
                   2.0 * half_x / columns,
                   2.0 * half_y / rows,
                   columns,
                   rows};
}

std::optional<double> brightest_pixel(const PixelGrid& grid, const std::vector<trace::Landing>& rays) {
  double total = 0.0;
  for (const trace::Landing& ray : rays)
    total += ray.power;
  if (rays.size() < fewest_rays || !(total > 0.0))
    return std::nullopt;
  std::vector<Lit> lit;
  lit.reserve(rays.size());
  for (const trace::Landing& ray : rays)
    lit.push_back({cell(ray.x, grid.x_from, grid.pitch_x, grid.columns),
                   cell(ray.y, grid.y_from, grid.pitch_y, grid.rows),
                   static_cast<std::uint64_t>(std::llround(ray.power / total * quanta)), 1});
  gather(lit);
  for (double pixels = 1.0;; pixels *= 4.0) {
    const Lit& brightest = *std::ranges::max_element(lit, {}, &Lit::quanta);
    if (brightest.rays >= fewest_rays)
      return static_cast<double>(brightest.quanta) / quanta * total / pixels;
    coarsen(lit);
  }
}

std::array<double, 4> map_area(const assembly::Assembly& assembly, const std::vector<trace::Landing>& rays) {
  const assembly::Clear& clear = assembly.surfaces[assembly.stations.back().surface].clear;
  if (const auto half = std::visit(HalfExtents{}, clear.opening))
    return {clear.at[0] - (*half)[0], clear.at[0] + (*half)[0], clear.at[1] - (*half)[1],
            clear.at[1] + (*half)[1]};
  constexpr double least_extent = 1e-6;
  std::array<double, 4> area{-least_extent, least_extent, -least_extent, least_extent};
  for (const trace::Landing& ray : rays)
    area = {std::min(area[0], ray.x), std::max(area[1], ray.x), std::min(area[2], ray.y),
            std::max(area[3], ray.y)};
  return area;
}

DetectorMap light_map(const std::array<double, 4>& area, const std::vector<trace::Landing>& rays) {
  constexpr double rays_per_cell = 8.0;
  constexpr double fewest = 24.0;
  constexpr double most = 256.0;
  const double width = area[1] - area[0];
  const double height = area[3] - area[2];
  const double cells =
      std::clamp(static_cast<double>(rays.size()) / rays_per_cell, fewest * fewest, most * most);
  const auto count = [&](double aspect) {
    return static_cast<std::size_t>(std::clamp(std::round(std::sqrt(cells * aspect)), 1.0, 4.0 * most));
  };
  DetectorMap map{area[0], area[1], area[2], area[3], count(width / height), count(height / width), {}};
  const double pitch_x = width / static_cast<double>(map.columns);
  const double pitch_y = height / static_cast<double>(map.rows);
  map.per_mm2.assign(map.columns * map.rows, 0.0);
  for (const trace::Landing& ray : rays)
    map.per_mm2[cell(ray.y, area[2], pitch_y, map.rows) * map.columns +
                cell(ray.x, area[0], pitch_x, map.columns)] += ray.power / (pitch_x * pitch_y);
  return map;
}

} // namespace lightledger::analysis
