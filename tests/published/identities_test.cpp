#include "published/boundaries.hpp"
#include "published/record.hpp"

#include <fmt/format.h>
#include <gtest/gtest.h>

namespace lightledger::published {
namespace {

TEST(PublishedIdentities, StokesReversibility) {
  Sheet sheet{"M01", "Reversibility at an interface, n = 1 to 1.5 at 37° and back",
              "G. G. Stokes, Camb. Dublin Math. J. 4, 1 (1849); E. Hecht, Optics, §4.10"};
  const Response in = bare(1.0, 1.5, 37.0);
  const double refracted_cosine = optics::normal_component(1.0, 1.5, cosine(37.0)).real() / 1.5;
  const Response out = optics::bare_boundary(1.5, 1.0, refracted_cosine);
  sheet.exactly("r_s + r_s'", 0.0, in.r_s + out.r_s)
      .exactly("r_p + r_p'", 0.0, in.r_p + out.r_p)
      .exactly("t_s t_s' − (1 − r_s²)", 0.0, in.t_s * out.t_s - (1.0 - in.r_s * in.r_s))
      .exactly("t_p t_p' − (1 − r_p²)", 0.0, in.t_p * out.t_p - (1.0 - in.r_p * in.r_p));
}

TEST(PublishedIdentities, SymmetricStackHasReflectionAndTransmissionInQuadrature) {
  Sheet sheet{"M03", "Symmetric lossless stack in air: 2.3 (0.07 λ), 1.45 (0.21 λ), 2.3 (0.07 λ), 40°",
              "V. Degiorgio, Am. J. Phys. 48, 81 (1980); A. Zeilinger, Am. J. Phys. 49, 882 (1981)"};
  const Layer layers[] = {{2.3, 0.07}, {1.45, 0.21}, {2.3, 0.07}};
  const Response at = stack(1.0, layers, 1.0, 40.0);
  const auto enter = [&](const char* name, Complex r, Complex t) {
    sheet.exactly(fmt::format("{}: Re(r conj t)", name), 0.0, (r * std::conj(t)).real())
        .exactly(fmt::format("{}: |r + t|", name), 1.0, std::abs(r + t))
        .exactly(fmt::format("{}: |r − t|", name), 1.0, std::abs(r - t));
  };
  enter("s", at.r_s, at.t_s);
  enter("p", at.r_p, at.t_p);
}

TEST(PublishedIdentities, TrivialStacks) {
  Sheet sheet{"M04", "Stacks that are none, n = 1 to 1.5 at 60° in p", "identities"};
  const Response plain = bare(1.0, 1.5, 60.0);
  const auto coated = [](double n, double thickness) {
    const Layer layers[] = {{n, thickness}};
    return stack(1.0, layers, 1.5, 60.0);
  };
  const auto path = [](double q, double thickness) {
    return std::polar(1.0, 2.0 * std::numbers::pi * q * thickness);
  };
  const double q_exit = optics::normal_component(1.0, 1.5, cosine(60.0)).real();
  const Response none = stack(1.0, {}, 1.5, 60.0);
  const Response thin = coated(2.0, 0.0);
  const Response exit_film = coated(1.5, 0.3);
  const Response entrance_film = coated(1.0, 0.3);
  sheet.exactly("no layer: r − r_p", 0.0, none.r_p - plain.r_p)
      .exactly("no layer: t − t_p", 0.0, none.t_p - plain.t_p)
      .exactly("zero thickness: r − r_p", 0.0, thin.r_p - plain.r_p)
      .exactly("zero thickness: t − t_p", 0.0, thin.t_p - plain.t_p)
      .exactly("film like the exit: r − r_p", 0.0, exit_film.r_p - plain.r_p)
      .exactly("film like the exit: t − t_p exp(2πi d n cosθ)", 0.0,
               exit_film.t_p - plain.t_p * path(q_exit, 0.3))
      .exactly("film like the entrance: r − r_p exp(4πi d cosθ)", 0.0,
               entrance_film.r_p - plain.r_p * path(2.0 * cosine(60.0), 0.3));
}

} // namespace
} // namespace lightledger::published
