#pragma once

#include "reader.hpp"

#include <lightledger/assembly/assembly.hpp>

#include <optional>
#include <string_view>
#include <vector>

namespace lightledger::assembly {

/// What the media are at the light's wavelengths, found out as they come into use.
class Coverage {
public:
  Coverage(Reader& reader, const std::vector<optics::Medium>& media,
           const std::vector<Wavelength>& wavelengths)
      : m_reader(reader), m_media(media), m_wavelengths(wavelengths) {}

  /// A fault at the place of use where the medium is not known at one of the light's wavelengths, or has an
  /// index there that no medium has.
  void check_known(MediumId id, Mark use);
  /// The same at the wavelength at which a layer's waves are counted.
  void check_known_at(MediumId id, double nm, Mark use);
  /// A fault where rays cannot go on in the medium: not known, or opaque.
  void check_transparent(MediumId id, Mark use);
  /// A fault where measured curves of this file do not reach one of the light's wavelengths.
  void check_measured(const Measured& measured, std::string_view file, Mark use);

  /// The first of the light's wavelengths at which the medium is opaque; none where it never is.
  [[nodiscard]] std::optional<double> opaque_at_nm(MediumId id) { return known(id).opaque_nm; }
  /// Whether the medium is a gas at all wavelengths; none where that is not known.
  [[nodiscard]] std::optional<bool> gas(MediumId id);

private:
  struct Known {
    std::optional<double> missing_nm; ///< the first wavelength at which nothing is known
    std::optional<double> strange_nm; ///< the first at which the index is one that no medium has
    std::optional<double> opaque_nm;  ///< the first at which the medium is opaque
    bool gas = true;
  };
  const Known& known(MediumId id);
  void refuse_strange(MediumId id, double nm, Mark use);

  Reader& m_reader;
  const std::vector<optics::Medium>& m_media;
  const std::vector<Wavelength>& m_wavelengths;
  std::vector<std::optional<Known>> m_known;
};

} // namespace lightledger::assembly
