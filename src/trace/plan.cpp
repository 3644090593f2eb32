#include <lightledger/assembly/films.hpp>
#include <lightledger/optics/boundary.hpp>
#include <lightledger/trace/curve.hpp>
#include <lightledger/trace/plan.hpp>

#include <algorithm>
#include <cmath>
#include <iterator>
#include <limits>
#include <numbers>

namespace lightledger::trace {
namespace {

using assembly::Assembly;
using assembly::Side;
using assembly::Surface;
using optics::Index;

static_assert(PlanOp::lowest_power == assembly::Asphere::lowest_power);
static_assert(PlanOp::lowest_power + PlanOp::terms - 1 == assembly::Asphere::highest_power);

constexpr double nm_per_mm = 1e6;

PlanLeg compile(const Leg& leg, const Assembly& assembly, const Bench& bench, double wavelength_nm) {
  const Frame& from = leg.launch ? bench.arriving.front() : bench.surface[leg.from];
  const Frame& to = bench.surface[leg.to];
  const bool aligned = from.axes == to.axes;
  Eigen::Matrix3d turn = Eigen::Matrix3d::Identity(); // exact where no axis turns
  if (!aligned)
    turn = to.axes.transpose() * from.axes;
  const Eigen::Vector3d shift = to.axes.transpose() * (from.origin - to.origin);
  const Index index = optics::index_at(assembly.media[leg.medium], wavelength_nm).value();

  PlanLeg plan{};
  plan.launch = leg.launch;
  for (int row = 0; row < 3; ++row) {
    plan.shift[row] = shift[row];
    for (int column = 0; column < 3; ++column)
      plan.rotation[row][column] = turn(row, column);
  }
  plan.kind = aligned && shift[0] == 0.0 && shift[1] == 0.0 ? LegKind::along_z : LegKind::rigid;
  plan.alpha = leg.launch ? 0.0 : 4.0 * std::numbers::pi * index.kappa / wavelength_nm * nm_per_mm;
  plan.index = index.n;
  return plan;
}

/// With terms that slope less than this at the hit and at the tangent plane, Newton's root is the nearest.
constexpr double gentle = 0.3;

double steepest_slope(const PlanOp& op, double r) {
  double slope = 0.0;
  for (int k = PlanOp::terms - 1; k >= 0; --k)
    slope = slope * r + (k + PlanOp::lowest_power) * std::abs(op.a[k]);
  return slope * r * r;
}

/// r² within which the terms, all taken with one sign, slope by less than `gentle`; by halving the exponent.
double gentle_radius_squared(const PlanOp& op) {
  double low = 1e-12;
  double high = 1e12;
  for (int round = 0; round < 60; ++round) {
    const double middle = std::sqrt(low * high);
    (steepest_slope(op, middle) < gentle ? low : high) = middle;
  }
  return low * low;
}

struct ShapeCompiler {
  PlanOp& op;

  void operator()(const assembly::Plane&) const { op.shape = ShapeKind::plane; }
  void operator()(const assembly::Sphere& sphere) const {
    op.shape = ShapeKind::sphere;
    op.curvature = 1.0 / sphere.radius;
  }
  void operator()(const assembly::Conic& conic) const {
    op.shape = ShapeKind::conic;
    op.curvature = 1.0 / conic.radius;
    op.conic = conic.conic;
  }
  void operator()(const assembly::Asphere& asphere) const {
    op.shape = ShapeKind::asphere;
    op.curvature = 1.0 / asphere.radius;
    op.conic = asphere.conic;
    std::copy(asphere.terms.begin(), asphere.terms.end(), op.a);
    for (int k = 0; k < PlanOp::terms; ++k) {
      if (op.a[k] == 0.0)
        continue;
      op.used_terms = k + 1;
      op.odd_terms |= (k + PlanOp::lowest_power) % 2 != 0;
    }
    op.gentle_squared = gentle_radius_squared(op);
  }
};

struct ClearCompiler {
  PlanOp& op;

  void operator()(const assembly::Clear::Unlimited&) const { set(ClearKind::unlimited, 0.0, 0.0); }
  void operator()(const assembly::Clear::Disc& disc) const { set(ClearKind::disc, disc.radius, disc.radius); }
  void operator()(const assembly::Clear::Rectangle& rectangle) const {
    set(ClearKind::rectangle, rectangle.half_width, rectangle.half_height);
  }
  void operator()(const assembly::Clear::Ellipse& ellipse) const {
    set(ClearKind::ellipse, ellipse.semi_x, ellipse.semi_y);
  }

private:
  void set(ClearKind kind, double x, double y) const {
    op.clear = kind;
    op.clear_x = x;
    op.clear_y = y;
  }
};

/// Fixed amplitudes along and across an axis; nothing for surfaces that leave the field as it is.
struct ElementCompiler {
  PlanOp& op;
  Side met_from;
  double wavelength_nm;

  void operator()(const assembly::Polarizer& polarizer) const {
    set(polarizer.axis_deg, std::sqrt(polarizer.pass), std::sqrt(polarizer.block));
    op.blocked[0] = 1.0 - polarizer.pass;
    op.blocked[1] = 1.0 - polarizer.block;
  }
  void operator()(const assembly::Retarder& retarder) const {
    const double dispersion = retarder.at_nm ? *retarder.at_nm / wavelength_nm : 1.0;
    set(retarder.axis_deg, 1.0, std::polar(1.0, retarder.retardance_deg * degree * dispersion));
  }
  void operator()(const assembly::Rotator& rotator) const {
    set(0.0, 1.0, 1.0);
    // About the ray; light on its way back sees a Faraday rotator turn the other way.
    const bool reversed = met_from == Side::beyond && rotator.kind == assembly::Rotator::Kind::faraday;
    const double angle = (reversed ? -1.0 : 1.0) * rotator.angle_deg * degree;
    op.turn[0] = std::cos(angle);
    op.turn[1] = std::sin(angle);
  }
  template <typename Untouched>
  void operator()(const Untouched&) const {}

private:
  static constexpr double degree = std::numbers::pi / 180.0;

  void set(double axis_deg, optics::Complex along, optics::Complex across) const {
    op.amplitude = AmplitudeKind::element;
    op.axis[0] = std::cos(axis_deg * degree);
    op.axis[1] = std::sin(axis_deg * degree);
    op.along[0] = along.real();
    op.along[1] = along.imag();
    op.across[0] = across.real();
    op.across[1] = across.imag();
    op.blocked[0] = op.blocked[1] = 0.0;
    op.turn[0] = 1.0;
    op.turn[1] = 0.0;
  }
};

/// Fills the optical part of an operator: media, coating, what becomes of the light that crosses.
class BoundaryCompiler {
public:
  BoundaryCompiler(const Assembly& assembly, const Surface& surface, double wavelength_nm)
      : m_assembly(assembly), m_surface(surface), m_wavelength_nm(wavelength_nm) {}

  void compile(PlanOp& op, Side met_from, Plan& plan) const {
    op.wavelength_nm = m_wavelength_nm;
    op.n1 = op.n2 = index(m_surface.before).n;
    op.scatter_reflected = op.scatter_transmitted = 0.0;
    op.amplitude = AmplitudeKind::none;
    if (!std::holds_alternative<assembly::Interface>(m_surface.effect)) {
      std::visit(ElementCompiler{op, met_from, m_wavelength_nm}, m_surface.effect);
      return;
    }
    media(op, met_from);
    amplitudes(op, met_from, plan);
    const double per_length = 2.0 * std::numbers::pi * m_surface.roughness_nm / m_wavelength_nm;
    op.scatter_reflected = 2.0 * per_length * op.n1;
    op.scatter_transmitted = per_length;
  }

private:
  [[nodiscard]] Index index(assembly::MediumId medium) const {
    return optics::index_at(m_assembly.media[medium], m_wavelength_nm).value();
  }

  void media(PlanOp& op, Side met_from) const {
    const Index before = index(m_surface.before);
    const Index beyond = m_surface.beyond ? index(*m_surface.beyond) : before;
    op.n1 = met_from == Side::before ? before.n : beyond.n;
    op.n2 = met_from == Side::before ? beyond.n : before.n;
    op.swallows = met_from == Side::before && optics::opaque(beyond);
    op.n2_kappa = op.swallows ? beyond.kappa : 0.0;
  }

  void amplitudes(PlanOp& op, Side met_from, Plan& plan) const {
    op.amplitude = op.swallows ? AmplitudeKind::metal : AmplitudeKind::fresnel;
    if (!m_surface.coating)
      return;
    const bool from_substrate = m_surface.coating->substrate == met_from;
    const auto& kind = m_assembly.coatings[m_surface.coating->coating].kind;
    if (const auto* ideal = std::get_if<assembly::Ideal>(&kind))
      coat(op, *ideal);
    else if (const auto* measured = std::get_if<assembly::Measured>(&kind))
      coat(op, *measured, from_substrate, plan);
    else
      coat(op, std::get<assembly::Layers>(kind), from_substrate, plan);
  }

  static void coat(PlanOp& op, const assembly::Ideal& ideal) {
    op.amplitude = AmplitudeKind::ideal;
    op.reflect_s = ideal.s.reflect;
    op.reflect_p = ideal.p.reflect;
    op.transmit_s = ideal.s.transmit;
    op.transmit_p = ideal.p.transmit;
  }

  void coat(PlanOp& op, const assembly::Layers& written, bool from_substrate, Plan& plan) const {
    const std::vector<optics::Layer> layers = assembly::optical_layers(m_assembly, written, m_wavelength_nm);
    auto& stack = plan.stacks.emplace_back(std::make_unique<PlanLayer[]>(layers.size()));
    std::ranges::transform(layers, stack.get(), [](const optics::Layer& layer) {
      return PlanLayer{layer.index.real(), layer.index.imag(), layer.thickness_nm};
    });
    // Written from the substrate outward; light that arrives at the outer side meets the last one first.
    if (!from_substrate)
      std::reverse(stack.get(), stack.get() + layers.size());
    op.lossless = !op.swallows && std::ranges::all_of(layers, [](const optics::Layer& layer) {
      return layer.index.imag() == 0.0;
    });
    op.amplitude = AmplitudeKind::stack;
    op.layers = stack.get();
    op.layer_count = static_cast<std::uint32_t>(layers.size());
  }

  void coat(PlanOp& op, const assembly::Measured& measured, bool from_substrate, Plan& plan) const {
    const std::vector<CurvePoint> points = curve(measured, m_wavelength_nm, from_substrate);
    auto& stored = plan.curves.emplace_back(std::make_unique<CurvePoint[]>(points.size()));
    std::copy(points.begin(), points.end(), stored.get());
    op.amplitude = AmplitudeKind::measured;
    op.curve = stored.get();
    op.curve_count = static_cast<std::uint32_t>(points.size());
    op.shift_index = measured.shift_index.value_or(0.0);
    op.curve_index = measured_in(measured);
  }

  /// The index of the medium that the angles of a measurement are in.
  [[nodiscard]] double measured_in(const assembly::Measured& measured) const {
    if (measured.from)
      return index(*measured.from).n;
    const auto opposite =
        m_surface.coating->substrate == Side::beyond ? std::optional(m_surface.before) : m_surface.beyond;
    return opposite ? index(*opposite).n : 1.0;
  }

  const Assembly& m_assembly;
  const Surface& m_surface;
  double m_wavelength_nm;
};

} // namespace

Plan compile(const Assembly& assembly, const Bench& bench, const Routes& routes, double wavelength_nm) {
  Plan plan{wavelength_nm, {}, {}, {}, {}, {}};
  for (const Leg& leg : routes.legs())
    plan.legs.push_back(compile(leg, assembly, bench, wavelength_nm));
  for (assembly::SurfaceId id = 0; id < assembly.surfaces.size(); ++id) {
    const Surface& surface = assembly.surfaces[id];
    PlanOp op{};
    std::visit(ShapeCompiler{op}, surface.shape);
    std::visit(ClearCompiler{op}, surface.clear.opening);
    op.hole = surface.clear.hole_radius;
    std::copy(surface.clear.at.begin(), surface.clear.at.end(), op.centre);
    op.loss = surface.loss;
    for (const Side side : {Side::before, Side::beyond}) {
      BoundaryCompiler(assembly, surface, wavelength_nm).compile(op, side, plan);
      plan.ops.push_back(op);
    }
  }
  return plan;
}

} // namespace lightledger::trace
