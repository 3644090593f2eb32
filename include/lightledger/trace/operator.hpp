#pragma once

#include <cstdint>

/// Legs and operators as plain numbers: what the kernel reads, and all it sees of the train. This header
/// stands for every instruction set, so it holds no code.
namespace lightledger::trace {

enum class LegKind : std::uint8_t { along_z, rigid };
enum class ShapeKind : std::uint8_t { plane, sphere, conic, asphere };
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

/// A layer of a coating: index n + i kappa, thickness in nm.
struct PlanLayer {
  double n, kappa, thickness_nm;
};

/// One point of a measured curve, as seen from the side that the light comes from: powers, and phases in rad.
struct CurvePoint {
  double x; ///< angle in degrees, or wavelength in nm for a curve that shifts with the angle
  double reflect_s, reflect_p, transmit_s, transmit_p;
  double phase_rs, phase_rp, phase_ts, phase_tp;
};

/// The amplitudes of a coating as polynomials in x = (cosθ − centre) · scale, θ in the rarer medium, for
/// cosθ1 in [least, most]. `coefficients` holds one row of degree + 1 numbers a quantity, the lowest power
/// first.
struct AmplitudeTable {
  enum Row { t_s_re, t_s_im, t_p_re, t_p_im, r_s_re, r_s_im, r_p_re, r_p_im, a_s, a_p, rows };
  static constexpr int highest_degree = 23;

  double least, most;
  double centre, scale;
  int degree;
  double coefficients[rows][highest_degree + 1];
};

/// A surface met from one side, as plain numbers at one wavelength; its own frame, mm.
struct PlanOp {
  static constexpr int lowest_power = 3;
  static constexpr int terms = 18;

  ShapeKind shape;
  double curvature;
  double conic;
  double a[terms];       ///< A3 … A20
  int used_terms;        ///< up to the last that is not zero
  bool odd_terms;        ///< one of A3, A5, … is not zero
  double gentle_squared; ///< r² below which the terms together slope by less than 0.3

  ClearKind clear;
  double clear_x, clear_y; ///< half lengths; the radius in both for a disc
  double hole;
  double centre[2];

  AmplitudeKind amplitude;
  double n1, n2;   ///< of incidence and, for light that goes on, beyond
  double n2_kappa; ///< of an absorbing backing
  double wavelength_nm;
  const PlanLayer* layers; ///< in the order in which the light meets them
  std::uint32_t layer_count;
  bool lossless;               ///< no layer and no exit absorbs
  const AmplitudeTable* table; ///< null: the layers are asked for every ray
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

} // namespace lightledger::trace
