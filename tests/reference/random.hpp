#pragma once

#include <cmath>
#include <cstddef>
#include <cstdint>
#include <initializer_list>
#include <random>
#include <vector>

namespace lightledger::reference {

/// Throws of dice that a seed repeats.
class Dice {
public:
  explicit Dice(std::uint64_t seed) : m_generator(seed) {}

  double between(double low, double high) { return low + (high - low) * unit(); }
  double around_zero(double size) { return between(-size, size); }
  /// Evenly in the logarithm.
  double magnitude(double low, double high) { return low * std::pow(high / low, unit()); }
  bool chance(double probability) { return unit() < probability; }
  int whole(int low, int high) { return low + static_cast<int>(unit() * (high - low + 1)); }

  template <typename T>
  T one_of(std::initializer_list<T> choices) {
    return choices.begin()[whole(0, static_cast<int>(choices.size()) - 1)];
  }
  template <typename T>
  const T& one_of(const std::vector<T>& choices) {
    return choices[static_cast<std::size_t>(whole(0, static_cast<int>(choices.size()) - 1))];
  }

private:
  double unit() { return static_cast<double>(m_generator() >> 11) * 0x1p-53; }

  std::mt19937_64 m_generator;
};

} // namespace lightledger::reference
