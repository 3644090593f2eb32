#include "published/record.hpp"

#include <lightledger/optics/medium.hpp>

#include <fmt/format.h>
#include <gtest/gtest.h>

namespace lightledger::published {
namespace {

// Fraunhofer's lines in nm.
constexpr double line_d = 587.5618;
constexpr double line_D = 589.29;
constexpr double line_F = 486.1327;
constexpr double line_C = 656.2725;

double index(const char* medium, double wavelength_nm) {
  return optics::index_at(optics::builtin_medium(medium).value(), wavelength_nm).value().n;
}

double abbe_number(const char* medium) {
  return (index(medium, line_d) - 1.0) / (index(medium, line_F) - index(medium, line_C));
}

TEST(PublishedMedia, CatalogueIndicesOfGlasses) {
  Sheet sheet{"N01", "Index and Abbe number of the optical glasses at 587.5618 nm",
              "SCHOTT optical glass catalogue, 20 January 2017"};
  struct Glass {
    const char *name, *n_d, *V_d;
  };
  const Glass glasses[] = {{"crown-487704", "1.48749", "70.41"}, {"crown-517642", "1.51680", "64.17"},
                           {"crown-522595", "1.52249", "59.48"}, {"crown-569560", "1.56883", "55.98"},
                           {"crown-589613", "1.58913", "61.27"}, {"crown-603606", "1.60311", "60.60"},
                           {"crown-620603", "1.62041", "60.32"}, {"flint-613443", "1.61340", "44.29"},
                           {"flint-620364", "1.62004", "36.37"}, {"flint-648339", "1.64769", "33.85"},
                           {"flint-699301", "1.69895", "30.07"}, {"flint-717295", "1.71736", "29.51"},
                           {"flint-728285", "1.72828", "28.53"}, {"flint-785257", "1.78472", "25.68"},
                           {"flint-805254", "1.80518", "25.36"}, {"flint-847238", "1.84666", "23.78"}};
  for (const Glass& glass : glasses)
    sheet.printed(fmt::format("n_d, {}", glass.name), glass.n_d, index(glass.name, line_d))
        .printed(fmt::format("V_d, {}", glass.name), glass.V_d, abbe_number(glass.name));
}

TEST(PublishedMedia, IndicesOfCrystalsAndLiquids) {
  Sheet sheet{"N02", "Indices of crystals and liquids",
              "handbook values of the media whose papers `lightledger media` names"};
  sheet.recalled("water, 589.29 nm, relative to vacuum", "1.33335", index("water", line_D))
      .recalled("fused silica, n_d", "1.45846", index("fused-silica", line_d))
      .recalled("fused silica, V_d", "67.8", abbe_number("fused-silica"))
      .recalled("fused silica, 1064 nm", "1.4496", index("fused-silica", 1064.0))
      .recalled("CaF2, n_d", "1.43385", index("CaF2", line_d))
      .recalled("MgF2, ordinary, n_d", "1.3777", index("MgF2", line_d))
      .recalled("sapphire, ordinary, n_d", "1.7682", index("sapphire", line_d))
      .recalled("ZnSe, 10.6 µm", "2.4028", index("ZnSe", 10600.0))
      .recalled("Ge, 10.6 µm", "4.00", index("Ge", 10600.0))
      .recalled("Si, 1550 nm", "3.48", index("Si", 1550.0));
}

} // namespace
} // namespace lightledger::published
