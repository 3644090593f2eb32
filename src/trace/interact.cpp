#include "kernel/kernel.hpp"

#include <lightledger/trace/interact.hpp>

#include <algorithm>

namespace lightledger::trace {
namespace {

void write(const Meeting& m, bool bounces, Tape& tape) {
  const auto count = static_cast<std::size_t>(m.count);
  std::copy_n(m.cos1, count, tape.cos_incident);
  std::copy_n(m.turn_cos, count, tape.turn_cos);
  std::copy_n(m.turn_sin, count, tape.turn_sin);
  const bool imaginary = bounces ? m.complex_r : m.complex_t;
  for (const int part : {0, 1}) {
    std::copy_n(bounces ? m.r_s[part] : m.t_s[part], count, tape.a_s[part]);
    std::copy_n(bounces ? m.r_p[part] : m.t_p[part], count, tape.a_p[part]);
  }
  if (!imaginary) {
    std::fill_n(tape.a_s[1], count, 0.0);
    std::fill_n(tape.a_p[1], count, 0.0);
  }
  tape.inside = m.inside;
}

/// Surfaces that leave the field as it is.
void write_untouched(int count, Tape& tape) {
  std::fill_n(tape.a_s[0], count, 1.0);
  std::fill_n(tape.a_p[0], count, 1.0);
}

} // namespace

InstructionSet interact(const PlanLeg& leg, const PlanOp& op, const optics::Coherency& coherency,
                        const RayBlock& in, const StepOut& out) {
  const Kernel& passes = kernel();
  Meeting meeting;
  meeting.count = in.count;
  meeting.alive = in.alive;
  meeting.hit = meeting.inside = meeting.crosses = 0;
  const Departing departing{out.pass, out.bounce, out.tape != nullptr ? &out.tape->hit : nullptr};
  passes.arrive(leg, op, in, departing, meeting);
  passes.respond(op, {out.pass != nullptr || !out.bounces, out.bounce != nullptr || out.bounces}, meeting);

  const Launched launched{coherency.xx, coherency.yy, coherency.xy.real(), coherency.xy.imag()};
  Entry unwanted;
  const std::uint64_t first = in.first;
  passes.settle(leg, op, launched, in, meeting, departing, out.bounces,
                out.entry != nullptr ? *out.entry : unwanted);
  if (out.tape != nullptr) {
    write(meeting, out.bounces, *out.tape);
    if (op.amplitude == AmplitudeKind::none)
      write_untouched(meeting.count, *out.tape);
  }
  const bool reflects = op.amplitude != AmplitudeKind::none && op.amplitude != AmplitudeKind::element;
  if (out.pass != nullptr) {
    out.pass->alive = meeting.inside & meeting.crosses;
    out.pass->first = first;
    out.pass->count = meeting.count;
  }
  if (out.bounce != nullptr) {
    out.bounce->alive = reflects ? meeting.inside : 0;
    out.bounce->first = first;
    out.bounce->count = meeting.count;
  }
  return passes.compiled_for;
}

} // namespace lightledger::trace
