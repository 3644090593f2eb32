#pragma once

#include <cstddef>
#include <cstdint>
#include <vector>

namespace lightledger::trace {

/// What arrived by one path, in the raw weights of the rays: sums, and moments about the centroid, which
/// merge without loss (Chan, Golub & LeVeque 1979).
struct PathSums {
  double power = 0.0;
  double x = 0.0, y = 0.0; ///< centroid, mm on the detector's surface
  double spread = 0.0;     ///< Σ power · distance² from the centroid
  double s1 = 0.0, s2 = 0.0, s3 = 0.0;

  /// Over launch points whose ray arrives along the intended path too.
  double shared = 0.0;       ///< power
  double excess = 0.0;       ///< Σ power · optical path beyond that of the intended path, mm
  double interference = 0.0; ///< Σ 2 |tr(J Φ J_i†)|
  double intensity = 0.0;    ///< Σ of both powers

  PathSums& operator+=(const PathSums& other);
  /// All powers times a factor; the centroid stays.
  PathSums& operator*=(double factor);
};

/// Sums of those paths of a tree that brought light, by number.
class PathTable {
public:
  using Number = std::uint64_t;
  struct Row {
    Number number;
    PathSums sums;
  };

  /// Rows in ascending order of their numbers.
  [[nodiscard]] const std::vector<Row>& rows() const { return m_rows; }
  [[nodiscard]] const PathSums* find(Number number) const;
  /// Index of the row of a path that has one.
  [[nodiscard]] std::size_t place(Number number) const;

  /// A path beyond all so far.
  void append(Number number, const PathSums& sums) { m_rows.push_back({number, sums}); }
  void clear() { m_rows.clear(); }

  PathTable& operator+=(const PathTable& other);
  PathTable& operator*=(double factor);

private:
  std::vector<Row> m_rows;
};

/// A set of path numbers as spans [first, end), ascending and apart from each other.
class PathSpans {
public:
  struct Span {
    std::uint64_t first, end;
  };

  [[nodiscard]] const std::vector<Span>& spans() const { return m_spans; }
  /// A span beyond all so far.
  void append(std::uint64_t first, std::uint64_t end);
  void clear() { m_spans.clear(); }

  /// The union with another set.
  PathSpans& operator+=(const PathSpans& other);

private:
  std::vector<Span> m_spans;
};

} // namespace lightledger::trace
