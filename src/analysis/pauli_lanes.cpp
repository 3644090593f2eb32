#include "pauli_lanes.hpp"

#include <cmath>

namespace lightledger::analysis {
namespace {

/// A complex number whose product is four multiplications, without the library's care for infinities, which
/// would keep loops from being vectorised.
struct Pair {
  double re, im;
};

inline Pair operator+(Pair a, Pair b) {
  return {a.re + b.re, a.im + b.im};
}
inline Pair operator-(Pair a, Pair b) {
  return {a.re - b.re, a.im - b.im};
}
inline Pair operator*(Pair a, Pair b) {
  return {a.re * b.re - a.im * b.im, a.re * b.im + a.im * b.re};
}
inline Pair operator*(double a, Pair b) {
  return {a * b.re, a * b.im};
}
inline Pair times_i(Pair a) {
  return {-a.im, a.re};
}

struct Four {
  Pair k[4];
};

inline Four load(const PauliLanes& k, int i) {
  return {{{k.re[0][i], k.im[0][i]},
           {k.re[1][i], k.im[1][i]},
           {k.re[2][i], k.im[2][i]},
           {k.re[3][i], k.im[3][i]}}};
}

inline double square(Pair a) {
  return a.re * a.re + a.im * a.im;
}

/// Σ over the lanes, in strips whose eight partial sums are added up last: always in the same order.
double sum(const LaneArray& terms, int count) {
  double part[strip] = {};
  for (int first = 0; first < count; first += strip)
    for (int i = 0; i < strip; ++i)
      part[i] += terms[first + i];
  return ((part[0] + part[1]) + (part[2] + part[3])) + ((part[4] + part[5]) + (part[6] + part[7]));
}

/// w k k† of each ray: diagonal 00, 11, 22, 33, then real and imaginary part of 01, 02, 03, 12, 13, 23.
struct CoherencyLanes {
  LaneArray t[16];
};

void outer(const PauliLanes& k, const LaneArray& weight, int count, CoherencyLanes& __restrict out) {
  for (int i = 0; i < count; ++i) {
    const Four f = load(k, i);
    const double w = weight[i];
    for (int j = 0; j < 4; ++j)
      out.t[j][i] = w * square(f.k[j]);
    int place = 4;
    for (int row = 0; row < 3; ++row)
      for (int column = row + 1; column < 4; ++column, place += 2) {
        const Pair a = f.k[row];
        const Pair b = f.k[column];
        out.t[place][i] = w * (a.re * b.re + a.im * b.im);
        out.t[place + 1][i] = w * (a.im * b.re - a.re * b.im);
      }
  }
}

enum Place { re01 = 4, im01, re02, im02, re03, im03, re12, im12, re13, im13, re23, im23 };

/// Rows 1 and 2 of the Mueller matrix of each ray, on the launched state, turned into the detector's basis.
void stokes(const CoherencyLanes& c, const ArrivalLanes& arrival, const optics::State& state, int count,
            LaneArray& __restrict s1, LaneArray& __restrict s2) {
  const auto& t = c.t;
  for (int i = 0; i < count; ++i) {
    const double equal = t[0][i] - t[3][i];
    const double unequal = t[1][i] - t[2][i];
    const double one = 2.0 * (t[re01][i] - t[im23][i]) + state.s1 * (equal + unequal) +
                       2.0 * (state.s2 * (t[re12][i] - t[im03][i]) + state.s3 * (t[re13][i] + t[im02][i]));
    const double two = 2.0 * (t[re02][i] + t[im13][i]) + state.s2 * (equal - unequal) +
                       2.0 * (state.s1 * (t[re12][i] + t[im03][i]) + state.s3 * (t[re23][i] - t[im01][i]));
    const double cosine = arrival.turn_cos[i];
    const double sine = arrival.turn_sin[i];
    const double cos2 = cosine * cosine - sine * sine;
    const double sin2 = 2.0 * cosine * sine;
    s1[i] = cos2 * one + sin2 * two;
    s2[i] = cos2 * two - sin2 * one;
  }
}

/// [[cos, sin], [−sin, cos]] K.
void turn(const PauliLanes& k, const ArrivalLanes& arrival, int count, PauliLanes& __restrict turned) {
  for (int i = 0; i < count; ++i) {
    const double c = arrival.turn_cos[i];
    const double s = arrival.turn_sin[i];
    const Four f = load(k, i);
    const Pair out[4] = {c * f.k[0] + s * times_i(f.k[3]), c * f.k[1] + s * f.k[2], c * f.k[2] - s * f.k[1],
                         c * f.k[3] + s * times_i(f.k[0])};
    for (int j = 0; j < 4; ++j) {
      turned.re[j][i] = out[j].re;
      turned.im[j][i] = out[j].im;
    }
  }
}

} // namespace

void multiply(const PauliLanes& after, const PauliLanes& before, int count, PauliLanes& __restrict product) {
  for (int i = 0; i < count; ++i) {
    const Four x = load(after, i);
    const Four y = load(before, i);
    const Pair* const a = x.k;
    const Pair* const b = y.k;
    const Pair out[4] = {a[0] * b[0] + a[1] * b[1] + (a[2] * b[2] + a[3] * b[3]),
                         a[0] * b[1] + a[1] * b[0] + times_i(a[2] * b[3] - a[3] * b[2]),
                         a[0] * b[2] + a[2] * b[0] + times_i(a[3] * b[1] - a[1] * b[3]),
                         a[0] * b[3] + a[3] * b[0] + times_i(a[1] * b[2] - a[2] * b[1])};
    for (int j = 0; j < 4; ++j) {
      product.re[j][i] = out[j].re;
      product.im[j][i] = out[j].im;
    }
  }
}

void mean_amplitude(const PauliLanes& k, int count, LaneArray& amplitude) {
  for (int i = 0; i < count; ++i) {
    const Four f = load(k, i);
    amplitude[i] = std::sqrt((square(f.k[0]) + square(f.k[1])) + (square(f.k[2]) + square(f.k[3])));
  }
}

void scale(PauliLanes& k, const LaneArray& factor, int count) {
  for (int j = 0; j < 4; ++j)
    for (int i = 0; i < count; ++i) {
      k.re[j][i] *= factor[i];
      k.im[j][i] *= factor[i];
    }
}

void set_identity(PauliLanes& k) {
  for (int j = 0; j < 4; ++j)
    for (int i = 0; i < lanes; ++i) {
      k.re[j][i] = j == 0 ? 1.0 : 0.0;
      k.im[j][i] = 0.0;
    }
}

void add_proper(const PauliLanes& k, const ArrivalLanes& arrival, const optics::State& state, int count,
                double* sums) {
  CoherencyLanes t;
  outer(k, arrival.weight, count, t);
  for (std::size_t q = 0; q < 16; ++q)
    sums[q] += sum(t.t[q], count);
  LaneArray s1;
  LaneArray s2;
  stokes(t, arrival, state, count, s1, s2);
  sums[16] += sum(s1, count);
  sums[17] += sum(s2, count);
}

void add_arriving(const PauliLanes& k, const ArrivalLanes& arrival, int count, double* sums) {
  PauliLanes turned;
  turn(k, arrival, count, turned);
  CoherencyLanes t;
  outer(turned, arrival.weight, count, t);
  for (std::size_t q = 0; q < 16; ++q)
    sums[q] += sum(t.t[q], count);
  LaneArray along[5];
  for (int i = 0; i < count; ++i) {
    const double w = arrival.weight[i];
    const double power = (t.t[0][i] + t.t[1][i]) + (t.t[2][i] + t.t[3][i]);
    along[0][i] = w * k.re[0][i];
    along[1][i] = w * k.im[0][i];
    along[2][i] = w;
    along[3][i] = power * arrival.turn_cos[i];
    along[4][i] = power * arrival.turn_sin[i];
  }
  for (std::size_t q = 0; q < 5; ++q)
    sums[16 + q] += sum(along[q], count);
}

optics::PauliCoherency coherency_at(const double* sums) {
  optics::PauliCoherency t;
  for (std::size_t j = 0; j < 4; ++j)
    t.diagonal[j] = sums[j];
  for (std::size_t j = 0; j < 6; ++j)
    t.upper[j] = {sums[4 + 2 * j], sums[5 + 2 * j]};
  return t;
}

} // namespace lightledger::analysis
