#include <lightledger/trace/sampling.hpp>

#include <cmath>
#include <numeric>

namespace lightledger::trace {
namespace {

template <class List>
double weights(const List& list) {
  return std::accumulate(list.begin(), list.end(), 0.0,
                         [](double sum, const auto& item) { return sum + item.weight; });
}

} // namespace

double standard_error(const Residuals& residuals) {
  double squares = 0.0;
  for (const double value : residuals)
    squares += value * value;
  return std::sqrt(squares / (replicates * (replicates - 1.0)));
}

std::vector<Group> groups(const Train& train, const Pupil& pupil) {
  const assembly::Light& light = train.assembly->light;
  const double all = weights(light.wavelengths) * weights(light.fields);
  std::vector<Group> groups;
  for (std::size_t w = 0; w < light.wavelengths.size(); ++w)
    for (std::size_t f = 0; f < light.fields.size(); ++f) {
      const assembly::Field& field = light.fields[f];
      groups.push_back({w, f, light.wavelengths[w].weight * field.weight / all, &train.plans[w],
                        Launcher(Source(light, field), pupil, train.footprints[f])});
    }
  return groups;
}

} // namespace lightledger::trace
