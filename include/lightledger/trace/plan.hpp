#pragma once

#include <lightledger/optics/boundary.hpp>
#include <lightledger/trace/bench.hpp>
#include <lightledger/trace/curve.hpp>
#include <lightledger/trace/routes.hpp>

#include <cstdint>
#include <memory>
#include <vector>

namespace lightledger::trace {

enum class LegKind : std::uint8_t { along_z, rigid };
enum class ShapeKind : std::uint8_t { plane, conic, asphere };
enum class ClearKind : std::uint8_t { unlimited, disc, rectangle, ellipse };
/// How a meeting changes the field: not at all, by the Fresnel amplitudes of two transparent media, by those
/// of an absorbing backing, by a stack of layers, by powers that are the same at every angle, by measured
/// curves, or by fixed amplitudes along and across an axis in the surface's plane.
enum class AmplitudeKind : std::uint8_t { none, fresnel, metal, stack, ideal, measured, element };

/// From the frame of one surface to that of the next: p' = rotation · p + shift (row by row, mm).
struct PlanLeg {
  LegKind kind;
  bool launch; ///< from the launch plane: no bulk, forward or backward
  double rotation[3][3];
  double shift[3];
  double alpha; ///< absorption 4πκ/λ in 1/mm
  double index;
};

/// A surface met from one side, as plain numbers at one wavelength; its own frame, mm.
struct PlanOp {
  static constexpr int lowest_power = assembly::Asphere::lowest_power;
  static constexpr int terms = assembly::Asphere::highest_power - lowest_power + 1;

  ShapeKind shape;
  double curvature;
  double conic;
  double a[terms]; ///< A3 … A20

  ClearKind clear;
  double clear_x, clear_y; ///< half lengths; the radius in both for a disc
  double hole;
  double centre[2];

  AmplitudeKind amplitude;
  double n1, n2;   ///< of incidence and, for light that goes on, beyond
  double n2_kappa; ///< of an absorbing backing
  double wavelength_nm;
  const optics::Layer* layers; ///< in the order in which the light meets them
  std::uint32_t layer_count;
  double reflect_s, reflect_p; ///< powers of an ideal coating
  double transmit_s, transmit_p;
  const CurvePoint* curve; ///< measured, ascending in x
  std::uint32_t curve_count;
  double curve_index;         ///< of the medium that its angles are in
  double shift_index;         ///< the curve is read at λ/√(1 − sin²θ/n²), θ in air; 0: at the angle
  double axis[2];             ///< of an element, in the surface's x, y
  double along[2], across[2]; ///< its amplitudes, real and imaginary part
  double blocked[2];          ///< the power it absorbs along and across
  double turn[2];             ///< cosine and sine of the angle by which it turns the field about the ray
  bool swallows;              ///< what crosses is absorbed: an opaque backing

  double scatter_reflected;   ///< x = this · cosθ1 (Bennett & Porteus 1961)
  double scatter_transmitted; ///< x = this · |n1 cosθ1 − n2 cosθ2|
  double loss;
};

/// Everything the tracer needs at one wavelength: all legs, and two operators a surface.
struct Plan {
  double wavelength_nm;
  std::vector<PlanLeg> legs;
  std::vector<PlanOp> ops;
  std::vector<std::unique_ptr<CurvePoint[]>> curves;
  std::vector<std::unique_ptr<optics::Layer[]>> stacks; ///< what the operators' `layers` point into
};

/// Compiles a train that was loaded and laid out without faults.
[[nodiscard]] Plan compile(const assembly::Assembly& assembly, const Bench& bench, const Routes& routes,
                           double wavelength_nm);

} // namespace lightledger::trace
