#include "csv.hpp"
#include "drawing_words.hpp"

#include <lightledger/report/drawing.hpp>

namespace lightledger::report {
namespace {

using namespace analysis;

/// Rows of one view, a point each.
class Points {
public:
  Points(Csv& csv, const DrawnView& view) : m_csv(csv), m_view(view) {}

  void add_all() {
    for (std::size_t i = 0; i < m_view.stations.size(); ++i) {
      for (const Polyline& piece : m_view.stations[i].section)
        add("section", i, m_view.stations[i].name, piece);
      add("outline", i, m_view.stations[i].name, m_view.stations[i].outline);
    }
    for (const DrawnGlass& body : m_view.glass)
      add("glass", body.front, m_view.stations[body.front].name, body.contour);
    add_rays("ray", m_view.rays);
    add_rays("ghost ray", m_view.ghost_rays);
  }

private:
  void add_rays(const char* kind, const std::vector<DrawnRay>& rays) {
    for (std::size_t i = 0; i < rays.size(); ++i)
      add(kind, i, name_of(rays[i].end), rays[i].points);
  }

  void add(const char* kind, std::size_t index, const std::string& name, const Polyline& line) {
    for (const Eigen::Vector3d& point : line) {
      m_csv.cell(name_of(m_view.along)).cell(kind).cell(std::to_string(index + 1)).cell(name);
      m_csv.cell(point[0]).cell(point[1]).cell(point[2]);
      m_csv.end_row();
    }
  }

  Csv& m_csv;
  const DrawnView& m_view;
};

} // namespace

std::string drawing_csv(const Drawing& drawing) {
  Csv csv;
  for (const char* heading : {"view", "kind", "number", "name", "x_mm", "y_mm", "z_mm"})
    csv.cell(heading);
  csv.end_row();
  for (const DrawnView& view : drawing.views)
    Points(csv, view).add_all();
  return csv.text();
}

} // namespace lightledger::report
