#pragma once

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/assembly/diagnostics.hpp>

#include <Eigen/Core>
#include <optional>
#include <string>
#include <vector>

namespace lightledger::analysis {

/// The axis of the bench along which one looks.
enum class View { x, y, z };

/// Points in bench coordinates, mm.
using Polyline = std::vector<Eigen::Vector3d>;

/// A station as one view shows it.
struct DrawnStation {
  std::string name, does;
  std::size_t first_visit;    ///< the first station of the same surface; its own number unless met again
  Eigen::Vector3d axis_point; ///< where the axis meets it
  Eigen::Vector3d across;     ///< unit vector in its plane that is seen at full length; zero if seen face-on
  Eigen::Vector3d normal;     ///< of its vertex, with the arriving light
  std::vector<Polyline> section; ///< the surface within its clear area, cut along `across`; two with a hole
  std::vector<Polyline> rear;    ///< the section of a plate's rear face; empty without one
  Polyline outline;              ///< the edge of the clear area, closed; empty where it is unlimited
};

/// What lies between two stations in a medium that is no gas, or between the faces of a plate: both sections,
/// joined at their edges.
struct DrawnGlass {
  std::size_t front, rear; ///< numbers of the stations, from 0; the same twice for a plate
  Polyline contour;
};

/// How a ray that is drawn ends.
enum class RayEnd { arrived, clipped, missed, turned_back };

struct DrawnRay {
  std::size_t field;
  Polyline points; ///< where it starts, then each surface that it meets
  RayEnd end;
};

/// All that is seen along one axis. The rays are a fan in the plane of the picture.
struct DrawnView {
  View along;
  std::vector<DrawnStation> stations;
  std::vector<DrawnGlass> glass;
  std::vector<DrawnRay> rays;
  std::vector<DrawnRay> ghost_rays; ///< of the ghost asked for; empty without one
};

struct Drawing {
  std::vector<DrawnView> views;
  std::vector<std::optional<std::string>> fields; ///< their names
  double wavelength_nm;                           ///< of the rays: the light's first
};

/// The bounces of a ghost by their names, as `analysis::Ghost` lists them.
using Bounces = std::vector<std::string>;

struct DrawingOptions {
  std::vector<View> views;        ///< empty: the one that shows most of the axis
  std::optional<Bounces> ghost{}; ///< whose rays are drawn as well
};

struct DrawingResult {
  std::optional<Drawing> drawing; ///< none where there are faults
  assembly::Faults faults;        ///< of the layout, or a ghost that is none
};

/// One path as a picture shows it.
struct PathPicture {
  std::vector<DrawnRay> rays;        ///< a fan of each field in the plane of the view
  std::vector<Eigen::Vector2d> spot; ///< where rays from all over the beam, of all fields, meet the detector:
                                     ///< in its own x and y, mm
};

/// Rays and spots of the intended path, then of ghosts; empty where the layout has faults. A ghost that the
/// routes do not hold has none.
[[nodiscard]] std::vector<PathPicture> path_pictures(const assembly::Assembly& assembly, View view,
                                                     const std::vector<Bounces>& ghosts);

/// Lays the train out and follows a few rays of each field through it, as they really run.
[[nodiscard]] DrawingResult drawing(const assembly::Assembly& assembly, const DrawingOptions& options = {});

} // namespace lightledger::analysis
