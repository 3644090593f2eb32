#include "lanes.hpp"

#include <lightledger/trace/interact.hpp>

#include <algorithm>

namespace lightledger::trace {
namespace {

/// Runs backwards longer than this, in mm, are told of; shorter ones are rounding between faces that touch.
constexpr double backward_tolerance = 1e-9;

/// J rotated into s, p, and the power in each.
struct Field {
  Lanes s[4], p[4]; ///< rows of J: x real, x imaginary, y real, y imaginary
  Lanes power_s, power_p;
};

/// w · row Φ row†.
double power(const optics::Coherency& phi, const double row[4], double weight) {
  const double cross_re = row[0] * row[2] + row[1] * row[3]; // Jx Jy*
  const double cross_im = row[1] * row[2] - row[0] * row[3];
  return weight *
         (phi.xx * (row[0] * row[0] + row[1] * row[1]) + phi.yy * (row[2] * row[2] + row[3] * row[3]) +
          2.0 * (cross_re * phi.xy.real() - cross_im * phi.xy.imag()));
}

Field rotate(const RayBlock& in, const optics::Coherency& phi, const Meeting& m) {
  Field field;
  for (int i = 0; i < m.count; ++i) {
    double s[4];
    double p[4];
    for (int k = 0; k < 4; ++k) {
      s[k] = m.turn_cos[i] * in.J[k][i] + m.turn_sin[i] * in.J[4 + k][i];
      p[k] = m.turn_cos[i] * in.J[4 + k][i] - m.turn_sin[i] * in.J[k][i];
      field.s[k][i] = s[k];
      field.p[k][i] = p[k];
    }
    field.power_s[i] = power(phi, s, in.w[i]);
    field.power_p[i] = power(phi, p, in.w[i]);
  }
  return field;
}

/// The share of each ray's power that the leg absorbs, over the ray's own path; none on a path run backwards.
void absorb_on_the_way(const PlanLeg& leg, const Meeting& m, Lanes& bulk) {
  for (int i = 0; i < m.count; ++i)
    bulk[i] = leg.alpha > 0.0 && m.hit[i] != 0 ? -std::expm1(-leg.alpha * std::max(m.path[i], 0.0)) : 0.0;
}

struct Amplitudes {
  const Lanes (&s)[2];
  const Lanes (&p)[2];
};

/// One of the two beams that leave: its rays and rows of J, with scatter and loss taken from the weight.
struct Beam {
  Amplitudes amplitudes;
  double loss;
  Lanes scattered; ///< share 1 − exp(−x²)
};

void apply(const Amplitudes& amplitudes, const Field& field, int i, double s[4], double p[4]) {
  for (int k = 0; k < 4; k += 2) {
    s[k] = amplitudes.s[0][i] * field.s[k][i] - amplitudes.s[1][i] * field.s[k + 1][i];
    s[k + 1] = amplitudes.s[0][i] * field.s[k + 1][i] + amplitudes.s[1][i] * field.s[k][i];
    p[k] = amplitudes.p[0][i] * field.p[k][i] - amplitudes.p[1][i] * field.p[k + 1][i];
    p[k + 1] = amplitudes.p[0][i] * field.p[k + 1][i] + amplitudes.p[1][i] * field.p[k][i];
  }
}

void scatter_passed(const PlanOp& op, const Meeting& m, Lanes& scattered) {
  for (int i = 0; i < m.count; ++i) {
    const double x = op.scatter_transmitted * (op.n1 * m.cos1[i] - op.n2 * m.cos2[i]);
    scattered[i] = op.scatter_transmitted > 0.0 ? -std::expm1(-x * x) : 0.0;
  }
}

void scatter_bounced(const PlanOp& op, const Meeting& m, Lanes& scattered) {
  for (int i = 0; i < m.count; ++i) {
    const double x = op.scatter_reflected * m.cos1[i];
    scattered[i] = op.scatter_reflected > 0.0 ? -std::expm1(-x * x) : 0.0;
  }
}

std::uint64_t bits(const Mask& mask, int count) {
  std::uint64_t all = 0;
  for (int i = 0; i < count; ++i)
    all |= (mask[i] & 1U) << i;
  return all;
}

/// Light that leaves: what both beams share, then direction and mask by kind.
void leave(const PlanLeg& leg, const Meeting& m, const Field& field, const Beam& beam, const Lanes& bulk,
           const RayBlock& in, RayBlock& out) {
  for (int i = 0; i < m.count; ++i) {
    double s[4];
    double p[4];
    apply(beam.amplitudes, field, i, s, p);
    for (int k = 0; k < 4; ++k) {
      out.J[k][i] = s[k];
      out.J[4 + k][i] = p[k];
    }
    for (int axis = 0; axis < 3; ++axis) {
      out.p[axis][i] = m.p[axis][i];
      out.u[axis][i] = m.s[axis][i];
    }
    out.opl[i] = in.opl[i] + leg.index * m.path[i];
    out.w[i] = in.w[i] * (1.0 - bulk[i]) * (1.0 - beam.scattered[i]) * (1.0 - beam.loss);
  }
  out.first = in.first;
  out.count = m.count;
}

/// k' = μ k + (cosθ2 − μ cosθ1) N with μ = n1/n2; accurate at normal incidence.
void aim_passed(const PlanOp& op, const Meeting& m, RayBlock& out) {
  const double mu = op.n1 / op.n2;
  for (int i = 0; i < m.count; ++i) {
    const double along = m.cos2[i] - mu * m.cos1[i];
    for (int axis = 0; axis < 3; ++axis)
      out.d[axis][i] = mu * m.d[axis][i] + along * m.normal[axis][i];
  }
}

/// A rotator turns the field by turning the basis that it is written in: u' = cosθ u + sinθ k × u.
void turn_basis(const PlanOp& op, RayBlock& out) {
  const double c = op.turn[0];
  const double s = op.turn[1];
  for (int i = 0; i < out.count; ++i) {
    const double ux = out.u[0][i];
    const double uy = out.u[1][i];
    const double uz = out.u[2][i];
    out.u[0][i] = c * ux + s * (out.d[1][i] * uz - out.d[2][i] * uy);
    out.u[1][i] = c * uy + s * (out.d[2][i] * ux - out.d[0][i] * uz);
    out.u[2][i] = c * uz + s * (out.d[0][i] * uy - out.d[1][i] * ux);
  }
}

void aim_bounced(const Meeting& m, RayBlock& out) {
  for (int i = 0; i < m.count; ++i)
    for (int axis = 0; axis < 3; ++axis)
      out.d[axis][i] = m.d[axis][i] - 2.0 * m.cos1[i] * m.normal[axis][i];
}

/// Enters what became of the power; sums run over the lanes in order.
class Bookkeeper {
public:
  Bookkeeper(const PlanLeg& leg, const optics::Coherency& phi, const RayBlock& in, const Meeting& meeting,
             const Field& field, const Lanes& bulk, const Beam& onward, const Beam* turned, bool bounces)
      : m_leg(leg), m_phi(phi), m_in(in), m(meeting), m_field(field), m_bulk(bulk), m_onward(onward),
        m_turned(turned), m_bounces(bounces) {}

  [[nodiscard]] Entry entry() const {
    Entry entry;
    for (int i = 0; i < m.count; ++i)
      if (m.alive[i] != 0)
        arrive(i, entry);
    return entry;
  }

private:
  void arrive(int i, Entry& entry) const {
    const double sent = m_field.power_s[i] + m_field.power_p[i];
    const double arriving = sent * (1.0 - m_bulk[i]);
    entry.bulk += sent * m_bulk[i];
    entry.incident += arriving;
    if (!m_leg.launch && m.hit[i] != 0 && m.path[i] < -backward_tolerance)
      entry.backward += sent;
    if (m.hit[i] == 0)
      entry.missed += arriving;
    else if (m.inside[i] == 0)
      entry.clipped += arriving;
    else
      meet(i, arriving, entry);
  }

  void meet(int i, double arriving, Entry& entry) const {
    const double power_s = m_field.power_s[i] * (1.0 - m_bulk[i]);
    const double power_p = m_field.power_p[i] * (1.0 - m_bulk[i]);
    const bool pass = !m_bounces;
    const double intended_s = pass ? m.crossed_s[i] : m.reflected_s[i];
    const double intended_p = pass ? m.crossed_p[i] : m.reflected_p[i];
    const double other_s = pass ? m.reflected_s[i] : m.crossed_s[i];
    const double other_p = pass ? m.reflected_p[i] : m.crossed_p[i];
    entry.aside += power_s * other_s + power_p * other_p;
    entry.absorbed += power_s * m.absorbed_s[i] + power_p * m.absorbed_p[i];
    const Sent sent = send(m_onward, i);
    entry.onward += sent.on;
    entry.scattered += sent.scattered;
    entry.extra += sent.extra;
    if (m_turned != nullptr)
      turn_back(i, entry);

    const double angle = std::atan2(std::sqrt(m.sin1_squared[i]), m.cos1[i]);
    entry.inside += arriving;
    if (m.extrapolated[i] != 0)
      entry.extrapolated += arriving;
    entry.pass_s += arriving * intended_s;
    entry.pass_p += arriving * intended_p;
    entry.incidence += arriving * angle;
    entry.least_incidence = std::min(entry.least_incidence, angle);
    entry.most_incidence = std::max(entry.most_incidence, angle);
  }

  struct Sent {
    double on, scattered, extra;
  };

  /// What goes on is read from the Jones matrix that goes on, so that a wrong amplitude shows in the closure.
  [[nodiscard]] Sent send(const Beam& beam, int i) const {
    double s[4];
    double p[4];
    apply(beam.amplitudes, m_field, i, s, p);
    const double weight = m_in.w[i] * (1.0 - m_bulk[i]);
    const double sent = power(m_phi, s, weight) + power(m_phi, p, weight);
    const double specular = sent * (1.0 - beam.scattered[i]);
    return {specular * (1.0 - beam.loss), sent * beam.scattered[i], specular * beam.loss};
  }

  /// A passed beam that does not exist, beyond the critical angle or in an opaque backing, takes no light on.
  void turn_back(int i, Entry& entry) const {
    if (m_bounces && m.crosses[i] == 0)
      return;
    const Sent sent = send(*m_turned, i);
    entry.turned += sent.on;
    entry.turned_scattered += sent.scattered;
    entry.turned_extra += sent.extra;
  }

  const PlanLeg& m_leg;
  const optics::Coherency& m_phi;
  const RayBlock& m_in;
  const Meeting& m;
  const Field& m_field;
  const Lanes& m_bulk;
  const Beam& m_onward;
  const Beam* m_turned; ///< the other beam where it is followed too
  bool m_bounces;       ///< onward is the reflected beam
};

void write(const Meeting& m, const Amplitudes& intended, Tape& tape) {
  for (int i = 0; i < m.count; ++i) {
    for (int axis = 0; axis < 3; ++axis)
      tape.hit[axis][i] = m.p[axis][i];
    tape.cos_incident[i] = m.cos1[i];
    tape.turn_cos[i] = m.turn_cos[i];
    tape.turn_sin[i] = m.turn_sin[i];
    for (int part = 0; part < 2; ++part) {
      tape.a_s[part][i] = intended.s[part][i];
      tape.a_p[part][i] = intended.p[part][i];
    }
  }
  tape.inside = bits(m.inside, m.count);
}

} // namespace

void interact(const PlanLeg& leg, const PlanOp& op, const optics::Coherency& coherency, const RayBlock& in,
              const StepOut& out) {
  Meeting m;
  Lanes bulk;
  intersect(leg, op, in, m);
  clip(op, m);
  orient(op, m);
  respond(op, m);
  const Field field = rotate(in, coherency, m);
  absorb_on_the_way(leg, m, bulk);

  Beam passed{{m.t_s, m.t_p}, op.loss, {}};
  Beam bounced{{m.r_s, m.r_p}, op.loss, {}};
  const bool bounces = out.bounces;
  const Beam& onward = bounces ? bounced : passed;
  if (out.pass != nullptr || !bounces)
    scatter_passed(op, m, passed.scattered);
  if (out.bounce != nullptr || bounces)
    scatter_bounced(op, m, bounced.scattered);

  const Beam* turned = out.pass != nullptr && out.bounce != nullptr ? &(bounces ? passed : bounced) : nullptr;
  if (out.entry != nullptr)
    *out.entry = Bookkeeper(leg, coherency, in, m, field, bulk, onward, turned, bounces).entry();
  if (out.tape != nullptr)
    write(m, onward.amplitudes, *out.tape);
  if (out.pass != nullptr) {
    leave(leg, m, field, passed, bulk, in, *out.pass);
    aim_passed(op, m, *out.pass);
    if (op.amplitude == AmplitudeKind::element)
      turn_basis(op, *out.pass);
    out.pass->alive = bits(m.inside, m.count) & bits(m.crosses, m.count);
  }
  if (out.bounce != nullptr) {
    leave(leg, m, field, bounced, bulk, in, *out.bounce);
    aim_bounced(m, *out.bounce);
    const bool reflects = op.amplitude != AmplitudeKind::none && op.amplitude != AmplitudeKind::element;
    out.bounce->alive = reflects ? bits(m.inside, m.count) : 0;
  }
}

} // namespace lightledger::trace
