#pragma once

#include <Eigen/Dense>

/// The textbook tracer: one ray at a time, in bench coordinates, written for reading. It is the second,
/// independent route to every number that the program computes; it shares with it the description of the
/// assembly, the look-up of refractive indices, and nothing else.
namespace lightledger::reference {

using Vector = Eigen::Vector3d;
using Rotation = Eigen::Matrix3d;

/// A place on the bench: its origin in mm, and its x, y, z axes as the columns of a rotation.
struct Frame {
  Vector origin = Vector::Zero();
  Rotation axes = Rotation::Identity();

  [[nodiscard]] Vector local(const Vector& bench_point) const {
    return axes.transpose() * (bench_point - origin);
  }
  [[nodiscard]] Vector bench(const Vector& local_point) const { return origin + axes * local_point; }
};

/// A straight ray: a point in mm and a unit vector.
struct Ray {
  Vector point;
  Vector direction;
};

} // namespace lightledger::reference
