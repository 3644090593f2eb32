#include "ideal.hpp"

#include "mapping.hpp"

#include <algorithm>

namespace lightledger::assembly {

namespace {

constexpr std::string_view forms =
    "{reflect: R}, {reflect: R, transmit: T}; R and T a fraction or {s: …, p: …}";
/// Decimal fractions that add up to 1 on paper may miss it by rounding.
constexpr double rounding = 1e-12;

/// Zero after a fault, so that nothing else seems wrong.
struct Pair {
  double s = 0.0;
  double p = 0.0;
};

Pair read_pair(Reader& reader, Value value) {
  if (reader.node(value).kind != Node::Kind::mapping) {
    const double both = reader.number(value, Unit::fraction, Bound::share).value_or(0.0);
    return {both, both};
  }
  Mapping pair(reader, value, "a fraction for s and p");
  const auto s = pair.need("s");
  const auto p = pair.need("p");
  pair.finish();
  const auto share = [&reader](std::optional<Value> part) {
    return part ? reader.number(*part, Unit::fraction, Bound::share).value_or(0.0) : 0.0;
  };
  return {share(s), share(p)};
}

bool too_much(double reflect, double transmit) {
  return reflect + transmit > 1.0 + rounding;
}

} // namespace

Ideal read_ideal(Reader& reader, Value value) {
  auto ideal = Mapping::read(reader, value, "an ideal coating", forms);
  if (!ideal)
    return {};
  const auto reflect = ideal->need("reflect");
  const auto transmit = ideal->take("transmit");
  ideal->finish();
  const Pair R = reflect ? read_pair(reader, *reflect) : Pair{};
  if (!transmit)
    return {{R.s, 1.0 - R.s}, {R.p, 1.0 - R.p}};
  const Pair T = read_pair(reader, *transmit);
  if (too_much(R.s, T.s) || too_much(R.p, T.p))
    reader.fault(reader.mark(*transmit), "'reflect' and 'transmit' add up to more than 1");
  return {{R.s, std::min(T.s, 1.0 - R.s)}, {R.p, std::min(T.p, 1.0 - R.p)}};
}

} // namespace lightledger::assembly
