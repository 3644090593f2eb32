// Doubles by the vector, in the instruction set that this file is compiled for; included once a set.
#if defined(LIGHTLEDGER_VECTORS_INL) == defined(HWY_TARGET_TOGGLE)
#ifdef LIGHTLEDGER_VECTORS_INL
#undef LIGHTLEDGER_VECTORS_INL
#else
#define LIGHTLEDGER_VECTORS_INL
#endif

#include <hwy/highway.h>

#include <cmath>
#include <cstdint>
#include <cstring>

HWY_BEFORE_NAMESPACE();
namespace lightledger::trace::HWY_NAMESPACE {

#if HWY_TARGET == HWY_EMU128 || HWY_TARGET == HWY_SCALAR

/// The portable set: one lane, fused by the mathematical library.
struct V {
  double x;
};
struct M {
  bool x;
};
struct W {
  std::uint64_t x;
};
inline constexpr int width = 1;

HWY_INLINE V set(double x) {
  return {x};
}
HWY_INLINE V load(const double* p) {
  return {*p};
}
HWY_INLINE void store(double* p, V a) {
  *p = a.x;
}
HWY_INLINE V operator+(V a, V b) {
  return {a.x + b.x};
}
HWY_INLINE V operator-(V a, V b) {
  return {a.x - b.x};
}
HWY_INLINE V operator*(V a, V b) {
  return {a.x * b.x};
}
HWY_INLINE V operator/(V a, V b) {
  return {a.x / b.x};
}
HWY_INLINE V fma(V a, V b, V c) {
  return {std::fma(a.x, b.x, c.x)};
}
HWY_INLINE V fms(V a, V b, V c) {
  return {std::fma(a.x, b.x, -c.x)};
}
HWY_INLINE V fnma(V a, V b, V c) {
  return {std::fma(-a.x, b.x, c.x)};
}
HWY_INLINE V neg(V a) {
  return {-a.x};
}
HWY_INLINE V abs(V a) {
  return {std::fabs(a.x)};
}
HWY_INLINE V min(V a, V b) {
  return {b.x < a.x ? b.x : a.x};
}
HWY_INLINE V max(V a, V b) {
  return {b.x > a.x ? b.x : a.x};
}
HWY_INLINE V root(V a) {
  return {std::sqrt(a.x)};
}
HWY_INLINE V round(V a) {
  return {std::nearbyint(a.x)};
}
HWY_INLINE V copysign(V a, V sign) {
  return {std::copysign(a.x, sign.x)};
}
HWY_INLINE M operator<(V a, V b) {
  return {a.x < b.x};
}
HWY_INLINE M operator<=(V a, V b) {
  return {a.x <= b.x};
}
HWY_INLINE M both(M a, M b) {
  return {a.x && b.x};
}
HWY_INLINE M either(M a, M b) {
  return {a.x || b.x};
}
HWY_INLINE M first_only(M a, M b) {
  return {a.x && !b.x};
}
HWY_INLINE M opposite(M a) {
  return {!a.x};
}
HWY_INLINE V select(M m, V yes, V no) {
  return m.x ? yes : no;
}
HWY_INLINE V keep(M m, V a) {
  return {m.x ? a.x : 0.0};
}
HWY_INLINE V add_where(M m, V sum, V a) {
  return {m.x ? sum.x + a.x : sum.x};
}
HWY_INLINE bool any(M m) {
  return m.x;
}
HWY_INLINE bool all(M m) {
  return m.x;
}
HWY_INLINE std::uint64_t bits(M m) {
  return m.x ? 1 : 0;
}
HWY_INLINE M mask(std::uint64_t word) {
  return {(word & 1U) != 0};
}
HWY_INLINE double sum(V a) {
  return a.x;
}
HWY_INLINE double least(V a) {
  return a.x;
}
HWY_INLINE double most(V a) {
  return a.x;
}
HWY_INLINE V gather(const double* p, V index) {
  return {p[static_cast<std::int64_t>(index.x)]};
}
HWY_INLINE W load(const std::uint64_t* p) {
  return {*p};
}
HWY_INLINE W set(std::uint64_t x) {
  return {x};
}
HWY_INLINE W operator+(W a, W b) {
  return {a.x + b.x};
}
template <int Bits>
HWY_INLINE W shift_right(W a) {
  return {a.x >> Bits};
}
template <int Bits>
HWY_INLINE W shift_left(W a) {
  return {a.x << Bits};
}
HWY_INLINE W operator-(W a, W b) {
  return {a.x - b.x};
}
HWY_INLINE V as_double(W a) {
  V v;
  std::memcpy(&v.x, &a.x, sizeof v.x);
  return v;
}
HWY_INLINE W as_word(V a) {
  W w;
  std::memcpy(&w.x, &a.x, sizeof w.x);
  return w;
}

#else

namespace hn = hwy::HWY_NAMESPACE;
using Doubles = hn::ScalableTag<double>;
using Words = hn::ScalableTag<std::uint64_t>;
using V = hn::Vec<Doubles>;
using M = hn::Mask<Doubles>;
using W = hn::Vec<Words>;
inline constexpr int width = HWY_MAX_BYTES / sizeof(double);

HWY_INLINE V set(double x) {
  return hn::Set(Doubles(), x);
}
HWY_INLINE V load(const double* p) {
  return hn::LoadU(Doubles(), p);
}
HWY_INLINE void store(double* p, V a) {
  hn::StoreU(a, Doubles(), p);
}
HWY_INLINE V fma(V a, V b, V c) {
  return hn::MulAdd(a, b, c);
}
HWY_INLINE V fms(V a, V b, V c) {
  return hn::MulSub(a, b, c);
}
HWY_INLINE V fnma(V a, V b, V c) {
  return hn::NegMulAdd(a, b, c);
}
HWY_INLINE V neg(V a) {
  return hn::Neg(a);
}
HWY_INLINE V abs(V a) {
  return hn::Abs(a);
}
HWY_INLINE V min(V a, V b) {
  return hn::Min(a, b);
}
HWY_INLINE V max(V a, V b) {
  return hn::Max(a, b);
}
HWY_INLINE V root(V a) {
  return hn::Sqrt(a);
}
HWY_INLINE V round(V a) {
  return hn::Round(a);
}
HWY_INLINE V copysign(V a, V sign) {
  return hn::CopySign(a, sign);
}
HWY_INLINE M both(M a, M b) {
  return hn::And(a, b);
}
HWY_INLINE M either(M a, M b) {
  return hn::Or(a, b);
}
HWY_INLINE M first_only(M a, M b) {
  return hn::AndNot(b, a);
}
HWY_INLINE M opposite(M a) {
  return hn::Not(a);
}
HWY_INLINE V select(M m, V yes, V no) {
  return hn::IfThenElse(m, yes, no);
}
HWY_INLINE V keep(M m, V a) {
  return hn::IfThenElseZero(m, a);
}
HWY_INLINE bool any(M m) {
  return !hn::AllFalse(Doubles(), m);
}
HWY_INLINE bool all(M m) {
  return hn::AllTrue(Doubles(), m);
}
#if HWY_TARGET == HWY_AVX3
HWY_INLINE V add_where(M m, V sum, V a) {
  return V{_mm512_mask_add_pd(sum.raw, m.raw, sum.raw, a.raw)};
}
HWY_INLINE std::uint64_t bits(M m) {
  return m.raw;
}
HWY_INLINE M mask(std::uint64_t word) {
  return {static_cast<__mmask8>(word)};
}
#else
HWY_INLINE V add_where(M m, V sum, V a) {
  return sum + keep(m, a);
}
HWY_INLINE std::uint64_t bits(M m) {
  std::uint8_t bytes[8] = {};
  hn::StoreMaskBits(Doubles(), m, bytes);
  return bytes[0];
}
HWY_INLINE M mask(std::uint64_t word) {
  const std::uint8_t bytes[8] = {static_cast<std::uint8_t>(word)};
  return hn::LoadMaskBits(Doubles(), bytes);
}
#endif
HWY_INLINE double sum(V a) {
  return hn::GetLane(hn::SumOfLanes(Doubles(), a));
}
HWY_INLINE double least(V a) {
  return hn::GetLane(hn::MinOfLanes(Doubles(), a));
}
HWY_INLINE double most(V a) {
  return hn::GetLane(hn::MaxOfLanes(Doubles(), a));
}
/// p at whole numbers below 2⁵¹.
HWY_INLINE V gather(const double* p, V index) {
  const hn::RebindToSigned<Doubles> whole;
  const V magic = set(0x1.8p52);
  const auto word = hn::BitCast(whole, index + magic) - hn::BitCast(whole, magic);
  return hn::GatherIndex(Doubles(), p, word);
}
HWY_INLINE W load(const std::uint64_t* p) {
  return hn::LoadU(Words(), p);
}
HWY_INLINE W set(std::uint64_t x) {
  return hn::Set(Words(), x);
}
template <int Bits>
HWY_INLINE W shift_right(W a) {
  return hn::ShiftRight<Bits>(a);
}
template <int Bits>
HWY_INLINE W shift_left(W a) {
  return hn::ShiftLeft<Bits>(a);
}
HWY_INLINE V as_double(W a) {
  return hn::BitCast(Doubles(), a);
}
HWY_INLINE W as_word(V a) {
  return hn::BitCast(Words(), a);
}

#endif

} // namespace lightledger::trace::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#endif
