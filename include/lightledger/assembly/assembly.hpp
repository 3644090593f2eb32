#pragma once

#include <lightledger/optics/medium.hpp>
#include <lightledger/optics/polarization.hpp>

#include <array>
#include <cstdint>
#include <memory>
#include <optional>
#include <string>
#include <variant>
#include <vector>

/// What the user wrote, as values: mm on the bench, nm for wavelengths, films and roughness, degrees for
/// angles.
namespace lightledger::assembly {

class Document;

using MediumId = std::uint32_t;  ///< index into Assembly::media
using CoatingId = std::uint32_t; ///< index into Assembly::coatings
using SurfaceId = std::uint32_t; ///< index into Assembly::surfaces
using StationId = std::uint32_t; ///< index into Assembly::stations

struct Wavelength {
  double nm;
  double weight = 1.0;
};

/// Degrees for an object at infinity, mm at a finite one.
struct Field {
  std::array<double, 2> at{};
  double weight = 1.0;
  std::optional<std::string> name;
};

/// The disc of launch in mm; `gaussian` is the 1/e² radius of irradiance.
struct Beam {
  bool fill_stop = false; ///< each field's rays fill the first stop; then nothing below applies
  double radius = 1.0;
  std::optional<double> gaussian;
  double inner = 0.0;
  std::array<double, 2> at{};
};

struct ToAccuracy {
  double standard_error = 1e-4;
};
struct Rings {
  std::uint64_t rings, spokes;
};
struct Grid {
  std::uint64_t across;
};
struct Scattered {
  std::uint64_t count;
};
using Sampling = std::variant<ToAccuracy, Rings, Grid, Scattered>;

struct Light {
  std::vector<Wavelength> wavelengths;
  optics::State polarization;
  std::optional<double> object_distance; ///< mm before the first station; negative: beyond; none: infinity
  std::vector<Field> fields{Field{}};
  Beam beam;
  Sampling sampling = ToAccuracy{};
  MediumId medium = 0;
};

/// One layer as written: `waves` of optical thickness at `at_nm`, or a thickness in nm.
struct Film {
  struct Waves {
    double waves, at_nm;
  };
  MediumId medium;
  std::variant<double, Waves> thickness;
  std::string address; ///< of the layer in the file
};

/// Layers from the substrate outward, repeats written out.
struct Layers {
  std::vector<Film> films;
};

/// The same power reflected and transmitted at every angle and from both sides; the rest is absorbed.
struct Ideal {
  struct Powers {
    double reflect, transmit;
  };
  Powers s, p;
};

/// Curves from a coater: points on a grid of wavelengths and angles, bilinear between them. The front is the
/// side that the light of the measurement came from.
struct Measured {
  struct Powers {
    double s, p;
  };
  /// Radians in our sign (growing with thickness), reflection at the outermost surface.
  struct Phases {
    double rs, rp, ts, tp;
  };
  struct Point {
    Powers reflect, transmit;
    Powers
        reflect_back; ///< met from the other side; 1 − T − A of the front where the file has no such columns
    Phases phases;    ///< those of an ideal coating where the file has none
  };

  std::vector<double> wavelengths_nm; ///< ascending
  std::vector<double> angles_deg;     ///< ascending, in `from`
  std::vector<Point> points;          ///< angles within wavelengths
  std::optional<MediumId> from;       ///< none: the side opposite the substrate, else air
  bool has_phases = false;
  std::optional<double> shift_index; ///< one angle only; read at λ/√(1 − sin²θ/n²), θ in air
};

struct Coating {
  std::string name;
  std::variant<Layers, Ideal, Measured> kind;
};

enum class Side { before, beyond };

struct CoatingUse {
  CoatingId coating;
  Side substrate = Side::beyond; ///< the side that the layers stand on; of no matter for ideal coatings
};

struct Plane {};
struct Sphere {
  double radius;
};
struct Conic {
  double radius, conic;
};
/// A conic plus Σ A_i r^i; `radius` is infinite where the base is a plane.
struct Asphere {
  static constexpr int lowest_power = 3;
  static constexpr int highest_power = 20;
  double radius, conic;
  std::array<double, highest_power - lowest_power + 1> terms{}; ///< A3 … A20 in mm^(1−power)
};
using Shape = std::variant<Plane, Sphere, Conic, Asphere>;

/// What of a surface is open, in its own x, y, in mm; edges belong to the inside.
struct Clear {
  struct Unlimited {};
  struct Disc {
    double radius;
  };
  struct Rectangle {
    double half_width, half_height;
  };
  struct Ellipse {
    double semi_x, semi_y;
  };
  std::variant<Unlimited, Disc, Rectangle, Ellipse> opening;
  double hole_radius = 0.0; ///< of the round obscuration about `at`, its edge open; 0: none
  std::array<double, 2> at{};
};

struct Interface {};
struct Opening {};
struct Sensor {
  std::optional<std::array<std::uint32_t, 2>> pixels;
  double reflectance = 0.0;
};
/// Acts along and across an axis that lies in the station's plane, projected across the ray.
struct Polarizer {
  double axis_deg; ///< from the surface's x toward its y
  double pass = 1.0, block = 0.0;
};
/// The field across the (fast) axis is multiplied by exp(+iδ).
struct Retarder {
  double axis_deg;
  double retardance_deg;
  std::optional<double> at_nm; ///< δ scales as at/λ; none: the same at all wavelengths
};
struct Rotator {
  enum class Kind { active, faraday };
  double angle_deg; ///< turns x toward y for light along the axis
  Kind kind;
};
using Effect = std::variant<Interface, Opening, Sensor, Polarizer, Retarder, Rotator>;

/// The plane back face of a plate whose front reflects: a surface of its own that no station visits.
struct Rear {
  SurfaceId surface; ///< its media and coating: `before` is the plate, `beyond` what lies behind
  double thickness;  ///< mm from vertex to vertex, along the front's normal
  std::array<double, 2> wedge_deg{}; ///< [a, b] turns it about its vertex by Rx(a) Ry(b), from parallel
};

struct Surface {
  Shape shape;
  Clear clear;
  Effect effect;
  MediumId before = 0;            ///< the medium the first visit arrives in
  std::optional<MediumId> beyond; ///< on the other side: `into` or `backing`
  std::optional<CoatingUse> coating;
  std::array<double, 3> tilt_deg{};
  std::array<double, 2> shift{};
  double roughness_nm = 0.0;
  double loss = 0.0;
  std::optional<Rear> rear; ///< of a reflecting surface with a transparent medium beyond
};

/// What light does at a visit.
enum class Act { pass, bounce, detect };

struct Focus {};
/// Up to where the axis meets the surface that the next station visits again.
struct UpToSurface {};
using Gap = std::variant<double, Focus, UpToSurface>;

/// One visit of the light to a surface, in the order of the train. The first station of a surface is the
/// visit that its tilt, shift and media are stated for; later ones (`again`) meet it where the axis meets the
/// plane tangent to its vertex.
struct Station {
  std::string name;
  SurfaceId surface;
  Act intended;
  Gap gap; ///< to the next station; 0 and without meaning at the last
  std::array<double, 3> turn_deg{};
};

enum class Sense { at_least, at_most };

struct Requirement {
  std::string quantity;
  Sense sense;
  double limit;
};

struct Assembly {
  std::string title;
  Light light;
  std::vector<optics::Medium> media; ///< the built-in ones that are used, and all the file's own
  std::vector<Coating> coatings;
  std::vector<Surface> surfaces;
  std::vector<Station> stations;
  std::vector<Requirement> requirements;
  std::shared_ptr<const Document> document; ///< where every value stands; null for an assembly built in code
};

/// The word of `does:` for a station.
[[nodiscard]] const char* does(const Assembly& assembly, const Station& station);

} // namespace lightledger::assembly
