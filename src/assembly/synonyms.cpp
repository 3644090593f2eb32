#include "synonyms.hpp"

#include <algorithm>
#include <array>
#include <cctype>

namespace lightledger::assembly {

namespace {

struct Meaning {
  std::string_view said; ///< blank-separated words, in small letters
  std::string_view meant;
};

/// In the order of preference where a word may mean several things.
constexpr auto meanings = std::to_array<Meaning>({
    {"thickness distance spacing separation space length air_gap airgap", "gap"},
    {"material glass medium index n after to next_medium backing", "into"},
    {"aperture diameter size opening semi_diameter semidiameter semi_aperture stop_radius ca", "clear"},
    {"curvature roc r curv radius_of_curvature", "radius"},
    {"k conic_constant kappa eccentricity", "conic"},
    {"aspheric aspherical asphere_terms coefficients terms", "asphere"},
    {"rotation rotate rotated angle angles tip orientation", "tilt"},
    {"offset decenter decentre decentering shifted displacement", "shift"},
    {"type kind action act role function mode surface", "does"},
    {"label id title station", "name"},
    {"substrate behind mirror metal into material glass medium", "backing"},
    {"film stack ar ar_coating", "coating"},
    {"scatter rms sigma rms_roughness", "roughness"},
    {"dust ageing aging absorption losses contamination", "loss"},
    {"bend deviation", "turn"},
    {"resolution pixel pixel_count", "pixels"},
    {"reflectivity", "reflectance"},
    {"reflection reflectance reflectivity r", "reflect"},
    {"transmission transmittance transmissivity t", "transmit"},
    {"obscuration obstruction inner central_obscuration", "hole"},
    {"center centre position decenter offset", "at"},
    {"semi_axes semiaxes axes", "ellipse"},
    {"d dia", "diameter"},
    {"x x_width w", "width"},
    {"y y_width h", "height"},
    {"wavelength lambda lambdas waves spectrum colours colors", "wavelengths"},
    {"wavelength lambda nm value", "at"},
    {"polarisation stokes state jones", "polarization"},
    {"source distance object_distance", "object"},
    {"field points angles field_points", "fields"},
    {"pupil disc disk spot aperture entrance_pupil", "beam"},
    {"sampling pattern ray accuracy", "rays"},
    {"environment ambient material surroundings", "medium"},
    {"waist w gauss fwhm", "gaussian"},
    {"inner_radius hole obscuration", "inner"},
    {"power intensity w", "weight"},
    {"number n points steps rays", "count"},
    {"start min first", "from"},
    {"stop end max last", "to"},
    {"rms_error error tolerance", "accuracy"},
    {"arms azimuths sectors", "spokes"},
    {"cells n size", "across"},
    {"n refractive_index ior real", "index"},
    {"k extinction imaginary absorption", "kappa"},
    {"data rows points nk", "table"},
    {"transmittance transmission internal", "internal_transmittance"},
    {"range valid_range wavelength_range", "range_nm"},
    {"reference citation", "source"},
    {"thickness d", "thickness_mm"},
    {"c", "C_um2"},
    {"material glass index n", "medium"},
    {"thick d nm physical_thickness gap depth", "thickness"},
    {"qwot quarter_waves optical_thickness wave", "waves"},
    {"reference at_nm wavelength", "at"},
    {"times count", "repeat"},
    {"films stack", "layers"},
    {"name coating", "use"},
    {"side", "substrate"},
    {"back back_face rear_face back_side second_face second_surface plate", "rear"},
    {"tilt angle angles wedge_angle", "wedge"},
    {"min minimum above greater_than", "at_least"},
    {"max maximum below less_than", "at_most"},
    {"metric measure what figure result", "quantity"},
    {"source illumination lamp laser beam", "light"},
    {"materials glasses medium", "media"},
    {"films stacks coating", "coatings"},
    {"surfaces elements stations system optics sequence", "train"},
    {"specs specifications limits goals targets requirement", "requirements"},
    {"name description", "title"},
    {"lens transmit refractive surface", "refract"},
    {"mirror bounce reflective", "reflect"},
    {"aperture diaphragm iris", "stop"},
    {"detector sensor image camera", "detect"},
    {"polarizer polariser", "polarize"},
    {"waveplate retarder plate", "retard"},
    {"rotator", "rotate"},
    {"inf infinite .inf", "infinity"},
    {"aluminium aluminum", "Al"},
    {"silver", "Ag"},
    {"gold", "Au"},
    {"copper", "Cu"},
    {"chromium chrome", "Cr"},
    {"nickel", "Ni"},
    {"titanium", "Ti"},
    {"tungsten", "W"},
    {"platinum", "Pt"},
    {"silicon", "Si"},
    {"germanium", "Ge"},
    {"silica quartz fused-quartz", "fused-silica"},
    {"bk7 n-bk7", "crown-517642"},
});

bool says(std::string_view said, std::string_view word) {
  for (std::size_t at = said.find(word); at != std::string_view::npos; at = said.find(word, at + 1)) {
    const bool begins = at == 0 || said[at - 1] == ' ';
    const std::size_t end = at + word.size();
    if (begins && (end == said.size() || said[end] == ' '))
      return true;
  }
  return false;
}

std::string small_letters(std::string_view word) {
  std::string result(word.substr(0, 64));
  std::transform(result.begin(), result.end(), result.begin(),
                 [](unsigned char letter) { return static_cast<char>(std::tolower(letter)); });
  return result;
}

} // namespace

std::string synonym(std::string_view word, const std::vector<std::string_view>& accepted) {
  const std::string small = small_letters(word);
  const auto means = [&](const Meaning& meaning) {
    return !small.empty() && says(meaning.said, small) &&
           std::find(accepted.begin(), accepted.end(), meaning.meant) != accepted.end();
  };
  const auto* const found = std::find_if(meanings.begin(), meanings.end(), means);
  return found == meanings.end() ? std::string() : std::string(found->meant);
}

} // namespace lightledger::assembly
