// Outlines as polygons, for the checks of a drawing only; the mesh makes its own.
#pragma once

#include <annulet/geometry/shapes.hpp>

#include <optional>
#include <span>
#include <utility>
#include <vector>

namespace annulet {

/// Lengths below this count as nothing: far below what any workshop makes.
inline constexpr double tiny_m = 1e-9;

/// Points of a path with chords of at most 5 degrees on arcs; the last point is left out when it meets the first.
std::vector<Vec2> centre_line(const StripPath& path);

/// The first pair of edges that cross, touch or fold back on each other, as indices of their starting points;
/// edge i runs from point i to point i+1. O(n log n) for ordinary outlines.
std::optional<std::pair<std::size_t, std::size_t>> first_crossing(std::span<const Vec2> points, bool closed);

double enclosed_area_m2(std::span<const Vec2> corners);

/// Closed loops of a shape, to be filled by the even-odd rule, arcs as chords of at most 2 degrees. Tapered paths
/// are taken at their greater width.
using Loops = std::vector<std::vector<Vec2>>;
Loops outline_loops(const Shape& shape);
/// Grown outward by `margin_m`.
Loops grown(const Loops& loops, double margin_m);
/// Area common to two regions, holes cut out.
double common_area_m2(const Loops& a, const Loops& a_holes, const Loops& b, const Loops& b_holes);

}  // namespace annulet
