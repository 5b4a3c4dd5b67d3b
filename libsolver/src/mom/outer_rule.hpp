// Points for the outer (testing) integral over a planar cell whose integrand is a static potential.
#pragma once

#include "mom/element.hpp"

#include <vector>

namespace annulet {

struct OuterPoint {
    Vec3 position{0, 0, 0};
    double weight_m2 = 0;
    int triangle = 0;  ///< of the fan
};

/// For touching or coincident cells, whose potential goes as x log x at the edges of the fan triangles: tensor
/// Gauss rule in collapsed coordinates with the polynomial change of variable t -> t^2 (3 - 2t) at singular ends.
std::vector<OuterPoint> graded_rule(const PlanarElement& test, int points);

/// For separate cells: 7-point rule of degree 5 [Radon1948] on fan triangles, bisected across their longest edge
/// until each is smaller than its distance to the source, at most `depth` times.
std::vector<OuterPoint> adaptive_rule(const PlanarElement& test, const PlanarElement& source, int depth);

/// Least distance between the corners and edges of two planar cells, m (0 if they share a corner).
double distance(const PlanarElement& a, const PlanarElement& b);

/// Least distance from a point to the outline or interior of a cell, m.
double distance(const PlanarElement& cell, const Vec3& r);

}  // namespace annulet
