#include <lightledger/trace/path_sums.hpp>

#include <algorithm>
#include <iterator>
#include <utility>

namespace lightledger::trace {

PathSums& PathSums::operator+=(const PathSums& other) {
  const double both = power + other.power;
  if (both > 0.0) {
    const double share = other.power / both;
    const double dx = other.x - x;
    const double dy = other.y - y;
    x += share * dx;
    y += share * dy;
    spread += other.spread + power * share * (dx * dx + dy * dy);
  }
  power = both;
  s1 += other.s1;
  s2 += other.s2;
  s3 += other.s3;
  shared += other.shared;
  excess += other.excess;
  interference += other.interference;
  intensity += other.intensity;
  return *this;
}

PathSums& PathSums::operator*=(double factor) {
  for (const auto sum : {&PathSums::power, &PathSums::spread, &PathSums::s1, &PathSums::s2, &PathSums::s3,
                         &PathSums::shared, &PathSums::excess, &PathSums::interference, &PathSums::intensity})
    this->*sum *= factor;
  return *this;
}

const PathSums* PathTable::find(Number number) const {
  const auto row = std::ranges::lower_bound(m_rows, number, {}, &Row::number);
  return row != m_rows.end() && row->number == number ? &row->sums : nullptr;
}

std::size_t PathTable::place(Number number) const {
  return static_cast<std::size_t>(std::ranges::lower_bound(m_rows, number, {}, &Row::number) -
                                  m_rows.begin());
}

/// In place where no path is new, which is the rule after the first rays.
PathTable& PathTable::operator+=(const PathTable& other) {
  std::vector<Row> fresh;
  auto mine = m_rows.begin();
  for (const Row& row : other.m_rows) {
    while (mine != m_rows.end() && mine->number < row.number)
      ++mine;
    if (mine != m_rows.end() && mine->number == row.number)
      mine->sums += row.sums;
    else
      fresh.push_back(row);
  }
  if (fresh.empty())
    return *this;
  std::vector<Row> merged;
  merged.reserve(m_rows.size() + fresh.size());
  std::ranges::merge(m_rows, fresh, std::back_inserter(merged), {}, &Row::number, &Row::number);
  m_rows = std::move(merged);
  return *this;
}

PathTable& PathTable::operator*=(double factor) {
  for (Row& row : m_rows)
    row.sums *= factor;
  return *this;
}

void PathSpans::append(std::uint64_t first, std::uint64_t end) {
  if (first == end)
    return;
  if (!m_spans.empty() && m_spans.back().end >= first)
    m_spans.back().end = std::max(m_spans.back().end, end);
  else
    m_spans.push_back({first, end});
}

PathSpans& PathSpans::operator+=(const PathSpans& other) {
  if (other.m_spans.empty())
    return *this;
  std::vector<Span> both;
  both.reserve(m_spans.size() + other.m_spans.size());
  std::ranges::merge(m_spans, other.m_spans, std::back_inserter(both), {}, &Span::first, &Span::first);
  m_spans.clear();
  for (const Span& span : both)
    append(span.first, span.end);
  return *this;
}

} // namespace lightledger::trace
