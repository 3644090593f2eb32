#include "display_width.hpp"
#include "drawing_words.hpp"
#include "figures.hpp"
#include "prose.hpp"

#include <lightledger/report/drawing.hpp>

#include <fmt/format.h>

#include <algorithm>

namespace lightledger::report {
namespace {

using analysis::DrawnView;

std::string describe(const DrawnView& view, const analysis::Drawing& drawing) {
  const auto lost = std::ranges::count_if(
      view.rays, [](const analysis::DrawnRay& ray) { return ray.end != analysis::RayEnd::arrived; });
  std::string sentence = fmt::format(
      "S{}; {} rays of {} field{} at {} nm", describe_view(view.along).substr(1), view.rays.size(),
      drawing.fields.size(), drawing.fields.size() == 1 ? "" : "s", plain(drawing.wavelength_nm));
  if (lost > 0)
    sentence += fmt::format(", {} of which {} not get through", lost, lost == 1 ? "does" : "do");
  return sentence;
}

} // namespace

std::string drawing_text(const assembly::Assembly& assembly, const analysis::Drawing& drawing,
                         const std::string& path, const std::vector<std::string>& warnings,
                         const TextStyle& style) {
  std::string text = heading(assembly, style.width) + '\n';
  for (const DrawnView& view : drawing.views)
    text += wrapped(fmt::format("{}.", describe(view, drawing)), style.width);
  text += wrapped(fmt::format("The drawing is in {}.", on_one_line(path)), style.width);
  return text + describe_warnings(warnings, style.width);
}

} // namespace lightledger::report
