#include "arrival.hpp"

#include <lightledger/optics/boundary.hpp>

namespace lightledger::optics {
namespace {

// Fresnel's r_s = (q1 − q2)/(q1 + q2) and r_p = (n2² c1 − n1 q2)/(n2² c1 + n1 q2), q = n cosθ, with the
// differences written as quotients by the sums: q1 − q2 = (n1² − n2²)/(q1 + q2) and
// n2² c1 − n1 q2 = (n2² − n1²)(c1² (n1² + n2²) − n1²)/(n2² c1 + n1 q2).
// T is double where light goes on without loss, else Complex.
template <class T>
Response fresnel(const Arrival& arrival, T n2, T q2) {
  const double n1 = arrival.n;
  const double c1 = arrival.c;
  const double q1 = arrival.q;
  const T contrast = (n2 - n1) * (n2 + n1);
  const T brewster = c1 * c1 * (n1 * n1 + n2 * n2) - n1 * n1;
  const T per_sum_s = reciprocal(q1 + q2);
  const T per_sum_p = reciprocal(n2 * n2 * c1 + n1 * q2);

  Response response;
  response.r_s = -contrast * (per_sum_s * per_sum_s);
  response.r_p = contrast * brewster * (per_sum_p * per_sum_p);
  response.t_s = 2.0 * std::sqrt(q1 * std::real(q2)) * per_sum_s;
  response.t_p = 2.0 * std::sqrt(q1 * arrival.power_p(q2)) * per_sum_p;
  return response;
}

} // namespace

Complex normal_component(double incident, Complex exit, double cos_incident) {
  return upper_root(Arrival{incident, cos_incident}.normal_squared(exit));
}

Response bare_boundary(double incident, Complex exit, double cos_incident) {
  const Arrival arrival{incident, cos_incident};
  const Complex q2_squared = arrival.normal_squared(exit);
  if (q2_squared.imag() == 0.0 && q2_squared.real() > 0.0)
    return fresnel(arrival, exit.real(), std::sqrt(q2_squared.real()));
  return fresnel(arrival, exit, upper_root(q2_squared));
}

} // namespace lightledger::optics
