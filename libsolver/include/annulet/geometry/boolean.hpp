// Planar regions joined, cut and offset on an integer grid of one nanometre.
#pragma once

#include <annulet/geometry/region.hpp>

#include <span>
#include <vector>

namespace annulet {

/// All results: outer loops counter-clockwise, holes clockwise. Inputs of the operations are such regions.
using Loops2 = std::vector<Loop>;

/// Resolution of the operations (m).
inline constexpr double region_grain_m = 1e-9;

/// The region of loops filled by the even-odd rule.
Loops2 filled(std::span<const Loop> loops);
/// A shape as a region, arcs as chords of at most one degree.
Loops2 region_of(const Shape& shape);
/// The union of loops by winding number not zero (all counter-clockwise cells, say).
Loops2 united(std::span<const Loop> loops);
Loops2 united(std::span<const Loop> a, std::span<const Loop> b);
Loops2 without(std::span<const Loop> a, std::span<const Loop> b);
Loops2 common(std::span<const Loop> a, std::span<const Loop> b);
/// Grown by `by_m` with round corners (shrunk where negative, with corners rounded likewise at its notches); arcs
/// deviate by at most `arc_error_m`.
Loops2 offset_by(std::span<const Loop> loops, double by_m, double arc_error_m);
/// Area (m^2), holes subtracted.
double area_of(std::span<const Loop> region);
/// Outer loops each with its own holes.
std::vector<Loops2> separate(std::span<const Loop> region);

}  // namespace annulet
