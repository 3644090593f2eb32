#pragma once

#include <Eigen/Core>
#include <complex>
#include <vector>

/// The tracer that a physicist writes from the book, and no more: the passed beam alone, 3×3 complex
/// matrices, films by their characteristic matrices with complex indices, one ray after the other; no ledger,
/// no apertures, no reflected amplitudes. What the kernel's speed is compared with.
namespace lightledger::bench {

using Complex = std::complex<double>;

struct TextbookFilm {
  Complex index;
  double thickness_nm;
};

/// A refracting sphere, or a plane where the curvature is 0.
struct TextbookFace {
  double curvature;
  double gap_before;
  double before, beyond;           ///< indices
  std::vector<TextbookFilm> films; ///< as the light meets them
};

struct TextbookRay {
  Eigen::Vector3d point, direction;
  Eigen::Matrix3cd polarization = Eigen::Matrix3cd::Identity();
  double optical_path = 0.0;
};

/// Takes a ray through all faces; its point is in the frame of the last.
void trace(const std::vector<TextbookFace>& faces, double wavelength_nm, TextbookRay& ray);

} // namespace lightledger::bench
