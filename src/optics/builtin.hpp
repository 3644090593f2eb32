#pragma once

#include <lightledger/optics/medium.hpp>

#include <span>
#include <string_view>
#include <variant>

/// The built-in media in the form in which the program holds them: constant tables, written by the build from
/// media.yaml, that cost nothing at the start.
namespace lightledger::optics {

struct SellmeierTerms {
  double A;
  std::span<const double> B, C_um2;
};

struct CauchyTerms {
  std::span<const double> A;
};

struct IndexRows {
  std::span<const IndexTable::Row> rows;
};

struct TransmittanceRows {
  double thickness_mm;
  std::span<const InternalTransmittance::Row> rows; ///< empty where no transmittance is given
};

struct BuiltinMedium {
  std::string_view name;
  std::variant<ConstantIndex, SellmeierTerms, CauchyTerms, IndexRows> dispersion;
  TransmittanceRows transmittance;
  Range range;
  std::string_view source;
};

/// The media of media.yaml, in its order.
extern const std::span<const BuiltinMedium> tabulated_media;

} // namespace lightledger::optics
