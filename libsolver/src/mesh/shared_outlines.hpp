// Outlines of regions that touch one another, divided once so that neighbours get the same points.
#pragma once

#include <annulet/geometry/boolean.hpp>

#include <functional>
#include <vector>

namespace annulet {

struct DividedLoop {
    Loop points;
    std::vector<bool> shared;  ///< edge from point i is also an edge of another loop
};

/// Corners of each loop and ends of shared stretches are kept; between them points are set anew with the spacing
/// `size_m`, at most 15 degrees of turn each (divided by `refine`), and moved off the chords so that the area of arcs
/// is kept.
std::vector<DividedLoop> divide_outlines(const Loops2& loops, const std::function<double(const Vec2&)>& size_m,
                                         double refine);

}  // namespace annulet
