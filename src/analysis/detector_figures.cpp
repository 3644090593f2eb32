#include "detector_figures.hpp"

#include <cmath>
#include <functional>
#include <numbers>

namespace lightledger::analysis {
namespace {

using optics::Mueller;
using optics::State;
using Samples = trace::Samples<PolarizationSums>;

constexpr double degrees = 180.0 / std::numbers::pi;
/// A state short of full polarization by less than this is fully polarized.
constexpr double nearly_full = 1e-9;
/// An extinction ratio beyond this is taken for boundless.
constexpr double least_remainder = 1e-12;

/// One wavelength's and field's sums per launched power.
struct GroupSums {
  double share;
  PolarizationSums sums;
};

/// Per launched power, without one of the replicates if one is named.
std::vector<GroupSums> gather(const Samples& samples, std::optional<std::size_t> without = {}) {
  std::vector<GroupSums> groups;
  for (const auto& sample : samples) {
    GroupSums group{sample.group.share, {std::vector<double>(sample.replicate.front().found.values.size())}};
    double launched = 0.0;
    for (std::size_t r = 0; r < sample.replicate.size(); ++r) {
      if (r == without)
        continue;
      launched += sample.replicate[r].launched;
      group.sums += sample.replicate[r].found;
    }
    for (double& value : group.sums.values)
      value = launched > 0.0 ? value / launched : 0.0;
    groups.push_back(std::move(group));
  }
  return groups;
}

PolarizationSums total(const std::vector<GroupSums>& groups) {
  PolarizationSums all{std::vector<double>(groups.front().sums.values.size())};
  for (const GroupSums& group : groups)
    all.add(group.share, group.sums);
  return all;
}

bool fully_polarized(State state) {
  return std::hypot(state.s1, state.s2, state.s3) > 1.0 - nearly_full;
}

/// Σ w |⟨Q e⊥|E⟩|² over Σ w |E|².
std::optional<double> leakage(const optics::PauliCoherency& t, State state, double delivered) {
  if (!fully_polarized(state) || !(delivered > 0.0))
    return std::nullopt;
  const auto crossing = optics::crossing(state);
  optics::Complex crossed = 0.0;
  for (std::size_t row = 0; row < 3; ++row)
    for (std::size_t column = 0; column < 3; ++column)
      crossed += crossing[row] * t.at(row + 1, column + 1) * std::conj(crossing[column]);
  return std::clamp(crossed.real() / delivered, 0.0, 1.0);
}

/// The figures that stations are blamed for, of the train or of the train with some of them neutral.
struct ProperFigures {
  std::optional<double> diattenuation, retardance_deg, depolarization, dop, cross_leakage;
};

ProperFigures proper_figures(const double* sums, State launched) {
  const optics::PauliCoherency t = coherency_at(sums);
  const Mueller m = optics::mueller(t);
  const optics::Stokes out = optics::through(m, optics::stokes(launched));
  ProperFigures figures;
  figures.diattenuation = optics::diattenuation(m);
  if (const auto parts = optics::decompose(m)) {
    figures.retardance_deg = parts->retardance_deg;
    figures.depolarization = parts->depolarization;
  }
  figures.dop = optics::degree_of_polarization({out[0], sums[16], sums[17], out[3]});
  figures.cross_leakage = leakage(t, launched, out[0]);
  return figures;
}

std::optional<double> difference(std::optional<double> one, std::optional<double> other) {
  return one && other ? std::optional(*one - *other) : std::nullopt;
}

AttributionFigures blame(const ProperFigures& train, const ProperFigures& neutral) {
  return {difference(train.diattenuation, neutral.diattenuation),
          difference(train.retardance_deg, neutral.retardance_deg), difference(neutral.dop, train.dop),
          difference(train.cross_leakage, neutral.cross_leakage)};
}

std::optional<double> extinction(std::optional<double> degree) {
  if (!degree || 1.0 - *degree < least_remainder)
    return std::nullopt;
  return (1.0 + *degree) / (1.0 - *degree);
}

Mueller detector_mueller(const double* arriving, double parity) {
  Mueller m = optics::mueller(coherency_at(arriving));
  for (const std::size_t row : {2U, 3U})
    for (double& element : m[row])
      element *= parity;
  return m;
}

/// Light of different wavelengths and fields does not interfere: powers of the groups' amplitudes are added.
std::optional<double> coherent_share(const std::vector<GroupSums>& groups) {
  double coherent = 0.0;
  double all = 0.0;
  for (const GroupSums& group : groups) {
    const double* const sums = group.sums.arriving();
    const double weight = sums[18];
    if (weight > 0.0)
      coherent += group.share * (sums[16] * sums[16] + sums[17] * sums[17]) / weight;
    all += group.share * (sums[0] + sums[1] + sums[2] + sums[3]);
  }
  return all > 0.0 ? std::optional(std::min(coherent / all, 1.0)) : std::nullopt;
}

std::optional<double> rotation_deg(const double* arriving, double parity) {
  const double cosine = arriving[19];
  const double sine = -parity * arriving[20];
  if (!(std::hypot(cosine, sine) > 0.0))
    return std::nullopt;
  return degrees * std::atan2(sine + 0.0, cosine);
}

SumFigures evaluate(const std::vector<GroupSums>& groups, State launched, double parity) {
  const PolarizationSums all = total(groups);
  const ProperFigures train = proper_figures(all.train(), launched);
  SumFigures figures;
  DetectorFigures& d = figures.detector;
  d.mueller = detector_mueller(all.arriving(), parity);
  d.stokes = optics::through(d.mueller, optics::stokes(launched));
  d.dop = optics::degree_of_polarization(d.stokes);
  d.azimuth_deg = optics::azimuth_deg(d.stokes);
  d.ellipticity_deg = optics::ellipticity_deg(d.stokes);
  d.depolarization_index = optics::depolarization_index(d.mueller);
  d.diattenuation = optics::diattenuation(d.mueller);
  d.polarizance = optics::polarizance(d.mueller);
  d.retardance_deg = train.retardance_deg;
  d.depolarization = train.depolarization;
  d.linear_extinction = extinction(optics::degree_of_linear_polarization(d.stokes));
  d.extinction = extinction(d.dop);
  d.cross_leakage = train.cross_leakage;
  d.coherent_share = coherent_share(groups);
  d.rotation_deg = rotation_deg(all.arriving(), parity);
  const std::size_t sets = (all.values.size() - arriving_sums) / proper_sums - 1;
  for (std::size_t set = 0; set < sets; ++set)
    figures.attribution.push_back(blame(train, proper_figures(all.neutral(set), launched)));
  return figures;
}

/// One number of the figures, and after how many of its units it comes round again (0: never).
struct Number {
  std::function<std::optional<double>(const SumFigures&)> get;
  std::function<void(SumFigures&, std::optional<double>)> set;
  double round = 0.0;
};

Number detector_number(std::optional<double> DetectorFigures::*member, double round = 0.0) {
  return {[member](const SumFigures& f) { return f.detector.*member; },
          [member](SumFigures& f, std::optional<double> value) { f.detector.*member = value; }, round};
}

Number attribution_number(std::size_t set, std::optional<double> AttributionFigures::*member) {
  return {[=](const SumFigures& f) { return f.attribution[set].*member; },
          [=](SumFigures& f, std::optional<double> value) { f.attribution[set].*member = value; }};
}

std::vector<Number> detector_numbers() {
  using D = DetectorFigures;
  std::vector<Number> numbers{
      detector_number(&D::dop),
      detector_number(&D::azimuth_deg, 180.0),
      detector_number(&D::ellipticity_deg),
      detector_number(&D::depolarization_index),
      detector_number(&D::diattenuation),
      detector_number(&D::polarizance),
      detector_number(&D::retardance_deg),
      detector_number(&D::depolarization),
      detector_number(&D::linear_extinction),
      detector_number(&D::extinction),
      detector_number(&D::cross_leakage),
      detector_number(&D::coherent_share),
      detector_number(&D::rotation_deg, 360.0),
  };
  for (std::size_t row = 0; row < 4; ++row) {
    numbers.push_back({[=](const SumFigures& f) { return f.detector.stokes[row]; },
                       [=](SumFigures& f, std::optional<double> value) { f.detector.stokes[row] = *value; }});
    for (std::size_t column = 0; column < 4; ++column)
      numbers.push_back(
          {[=](const SumFigures& f) { return f.detector.mueller[row][column]; },
           [=](SumFigures& f, std::optional<double> value) { f.detector.mueller[row][column] = *value; }});
  }
  return numbers;
}

std::vector<Number> all_numbers(std::size_t sets) {
  using A = AttributionFigures;
  std::vector<Number> numbers = detector_numbers();
  for (std::size_t set = 0; set < sets; ++set)
    for (const auto member : {&A::diattenuation, &A::retardance_deg, &A::dop_loss, &A::cross_leakage})
      numbers.push_back(attribution_number(set, member));
  return numbers;
}

/// √((n − 1)/n Σ (x_r − mean)²), differences taken the short way round.
std::optional<double> jackknife(const std::vector<SumFigures>& without, const Number& number) {
  const auto origin = number.get(without.front());
  const auto n = static_cast<double>(without.size());
  double sum = 0.0;
  double squares = 0.0;
  for (const SumFigures& figures : without) {
    const auto value = number.get(figures);
    if (!origin || !value)
      return std::nullopt;
    const double offset =
        number.round > 0.0 ? std::remainder(*value - *origin, number.round) : *value - *origin;
    sum += offset;
    squares += offset * offset;
  }
  return std::sqrt(std::max(squares - sum * sum / n, 0.0) * (n - 1.0) / n);
}

} // namespace

SumFigures sum_figures(const Samples& samples, State launched, double parity) {
  return evaluate(gather(samples), launched, parity);
}

SumFigures sum_errors(const Samples& samples, State launched, double parity) {
  std::vector<SumFigures> without;
  for (std::size_t r = 0; r < trace::replicates; ++r)
    without.push_back(evaluate(gather(samples, r), launched, parity));
  SumFigures errors;
  errors.attribution.resize(without.front().attribution.size());
  for (const Number& number : all_numbers(errors.attribution.size()))
    number.set(errors, jackknife(without, number));
  return errors;
}

} // namespace lightledger::analysis
