#include <lightledger/trace/ledger.hpp>

#include <algorithm>
#include <array>
#include <cstddef>

namespace lightledger::trace {
namespace {

constexpr std::array powers = {
    &Entry::incident, &Entry::missed,           &Entry::clipped,      &Entry::onward,       &Entry::aside,
    &Entry::absorbed, &Entry::scattered,        &Entry::extra,        &Entry::bulk,         &Entry::backward,
    &Entry::turned,   &Entry::turned_scattered, &Entry::turned_extra, &Entry::extrapolated, &Entry::inside,
    &Entry::pass_s,   &Entry::pass_p,           &Entry::incidence};

/// Where power that was launched and not delivered may have gone.
constexpr std::array losses = {&Entry::missed,    &Entry::clipped, &Entry::aside, &Entry::absorbed,
                               &Entry::scattered, &Entry::extra,   &Entry::bulk};

} // namespace

Entry& Entry::operator+=(const Entry& other) {
  for (const auto power : powers)
    this->*power += other.*power;
  least_incidence = std::min(least_incidence, other.least_incidence);
  most_incidence = std::max(most_incidence, other.most_incidence);
  return *this;
}

Entry& Entry::operator*=(double factor) {
  for (const auto power : powers)
    this->*power *= factor;
  return *this;
}

void Ledger::enter(std::size_t station, const Entry& found) {
  Entry row = found;
  row.bulk = row.backward = 0.0;
  rows[station] += row;
  if (station > 0) {
    rows[station - 1].bulk += found.bulk;
    rows[station - 1].backward += found.backward;
  }
}

double Ledger::closure_error() const {
  double lost = 0.0;
  for (const Entry& row : rows)
    for (const auto loss : losses)
      lost += row.*loss;
  return launched - delivered() - lost;
}

Ledger& Ledger::operator+=(const Ledger& other) {
  launched += other.launched;
  for (std::size_t i = 0; i < rows.size(); ++i)
    rows[i] += other.rows[i];
  return *this;
}

Ledger& Ledger::operator*=(double factor) {
  launched *= factor;
  for (Entry& row : rows)
    row *= factor;
  return *this;
}

} // namespace lightledger::trace
