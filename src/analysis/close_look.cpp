#include "close_look.hpp"

#include "ghost_list.hpp"
#include "pixels.hpp"

#include <lightledger/trace/landings.hpp>
#include <lightledger/trace/path_image.hpp>

#include <algorithm>

namespace lightledger::analysis {
namespace {

using trace::PathTree;
using trace::TracedTree;

constexpr std::uint64_t usual_paths = 10;
constexpr std::uint64_t most_paths = 100;
constexpr std::uint64_t rays_for_reflectance = 1024; ///< per field and wavelength
constexpr std::uint64_t rays_for_pixels = 4096;      ///< at least
constexpr std::uint64_t rays_in_all = 16'384;        ///< at least
constexpr std::uint64_t most_rays = 65'536;

std::uint64_t rays(const trace::Train& train, const TracedTree& traced, bool pixels) {
  if (!pixels)
    return rays_for_reflectance;
  const assembly::Light& light = train.assembly->light;
  const std::uint64_t groups = light.fields.size() * light.wavelengths.size();
  return std::clamp(std::max(traced.rays, rays_in_all) / groups, rays_for_pixels, most_rays);
}

} // namespace

void look_closely(const trace::Train& train, const PathTree& tree, const TracedTree& traced,
                  const GhostOptions& options, Ghosts& ghosts) {
  const auto grid = pixel_grid(*train.assembly);
  const std::uint64_t count = rays(train, traced, grid || options.maps);
  const std::vector<PathTree::PathNumber> numbers = brightest(tree, traced.total.paths);
  for (std::size_t i = 0; i < ghosts.paths.size(); ++i)
    ghosts.paths[i].defocus_mm = trace::paraxial_image(train, tree.way(numbers[i]));

  std::optional<double> image_peak;
  std::array<double, 4> area{};
  if (grid || options.maps) {
    const std::vector<trace::Landing> image = trace::land(train, train.path, count, options.threads).rays;
    image_peak = grid ? brightest_pixel(*grid, image) : std::nullopt;
    area = map_area(*train.assembly, image);
    if (options.maps)
      ghosts.image_map = light_map(area, image);
  }
  const std::size_t closely = std::min<std::uint64_t>(ghosts.paths.size(), options.top.value_or(usual_paths));
  for (std::size_t i = 0; i < std::min<std::size_t>(closely, most_paths); ++i) {
    Ghost& ghost = ghosts.paths[i];
    const PathTree::Way way = tree.way(numbers[i]);
    const trace::Landings landings = trace::land(train, way.path, count, options.threads);
    for (const std::size_t step : way.bounces)
      ghost.cure.push_back({landings.reflectances[step], {}});
    const auto peak = grid ? brightest_pixel(*grid, landings.rays) : std::nullopt;
    if (peak && image_peak)
      ghost.peak_ratio = *peak / *image_peak;
    if (options.maps)
      ghosts.maps.push_back(light_map(area, landings.rays));
  }
}

} // namespace lightledger::analysis
