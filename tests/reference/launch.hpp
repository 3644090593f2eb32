#pragma once

#include "reference/geometry.hpp"

#include <lightledger/assembly/assembly.hpp>

#include <array>

namespace lightledger::reference {

/// The ray of a field through a point of the disc (mm, in the plane z = 0 of the first station's arriving
/// frame, which is also the bench's own).
[[nodiscard]] Ray launch(const assembly::Light& light, const assembly::Field& field,
                         const std::array<double, 2>& disc_point);

/// The transverse x and y of a ray: those of the bench, carried by the smallest rotation that takes z onto
/// the ray.
[[nodiscard]] Eigen::Matrix<double, 3, 2> double_pole_basis(const Vector& direction);

/// ⟨E E†⟩ of a state of unit power in its transverse basis, with S3 = 2 Im(Ex* Ey).
[[nodiscard]] Eigen::Matrix2cd coherency_matrix(const optics::State& state);

} // namespace lightledger::reference
