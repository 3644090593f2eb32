#pragma once

#include <lightledger/assembly/assembly.hpp>
#include <lightledger/assembly/diagnostics.hpp>
#include <lightledger/optics/boundary.hpp>

#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lightledger::assembly {

/// A medium by its name: one of the assembly's, else a built-in one; none if there is no such name.
[[nodiscard]] std::optional<optics::Medium> medium_named(const Assembly& assembly, std::string_view name);

/// A coating of the assembly by its name, also one that no station uses.
[[nodiscard]] std::optional<CoatingId> coating_named(const Assembly& assembly, std::string_view name);

/// Where a medium is known, as a sentence begins: "crown-517642 is known from 300 to 2500 nm".
[[nodiscard]] std::string known_range(const optics::Medium& medium);

/// Why layers cannot be computed at a wavelength in nm (a medium is not known there, or not where its layer's
/// waves are counted), with the place of the layer; none where they can.
[[nodiscard]] std::optional<Fault> unknown_layer(const Assembly& assembly, const Layers& layers,
                                                 double wavelength_nm);

/// Layers from the substrate outward as indices and thicknesses in nm at a wavelength in nm. Waves of optical
/// thickness become waves · at / n(at), n the real index. All media must be known there (see unknown_layer).
[[nodiscard]] std::vector<optics::Layer> optical_layers(const Assembly& assembly, const Layers& layers,
                                                        double wavelength_nm);

} // namespace lightledger::assembly
