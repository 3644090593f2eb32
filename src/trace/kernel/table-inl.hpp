// A coating's amplitudes from its table. Included once an instruction set.
#if defined(LIGHTLEDGER_TABLE_INL) == defined(HWY_TARGET_TOGGLE)
#ifdef LIGHTLEDGER_TABLE_INL
#undef LIGHTLEDGER_TABLE_INL
#else
#define LIGHTLEDGER_TABLE_INL
#endif

#include "response-inl.hpp"

HWY_BEFORE_NAMESPACE();
namespace lightledger::trace::HWY_NAMESPACE {

HWY_INLINE M within(const AmplitudeTable& table, V c1) {
  return both(set(table.least) <= c1, c1 <= set(table.most));
}

/// Horner's rule for several rows at once.
template <int Rows>
HWY_INLINE void evaluate(const AmplitudeTable& table, int first, V x, V (&values)[Rows]) {
  for (int row = 0; row < Rows; ++row)
    values[row] = set(table.coefficients[first + row][table.degree]);
  for (int k = table.degree - 1; k >= 0; --k)
    for (int row = 0; row < Rows; ++row)
      values[row] = fma(values[row], x, set(table.coefficients[first + row][k]));
}

HWY_INLINE Response tabulated(const PlanOp& op, V c1, V normal_part, bool reflected) {
  const AmplitudeTable& table = *op.table;
  const V cosine = op.n1 <= op.n2 || op.swallows ? c1 : normal_part * set(1.0 / op.n2);
  const V x = (cosine - set(table.centre)) * set(table.scale);
  const V zero = set(0.0);
  Response response{{zero, zero}, {zero, zero}, {zero, zero}, {zero, zero}, zero, zero};
  V values[4];
  evaluate(table, AmplitudeTable::t_s_re, x, values);
  response.t_s = {values[0], values[1]};
  response.t_p = {values[2], values[3]};
  if (reflected) {
    evaluate(table, AmplitudeTable::r_s_re, x, values);
    response.r_s = {values[0], values[1]};
    response.r_p = {values[2], values[3]};
  }
  if (!op.lossless) {
    V kept[2];
    evaluate(table, AmplitudeTable::a_s, x, kept);
    response.a_s = kept[0];
    response.a_p = kept[1];
  }
  return response;
}

} // namespace lightledger::trace::HWY_NAMESPACE
HWY_AFTER_NAMESPACE();

#endif
