#include "mom/outer_rule.hpp"

#include <Eigen/Geometry>
#include <annulet/numerics/quadrature.hpp>

#include <algorithm>
#include <cmath>

namespace annulet {

namespace {

using Corners = std::array<Vec3, 3>;

double distance_to_segment(const Vec3& a, const Vec3& b, const Vec3& r) {
    const Vec3 ab = b - a;
    const double s = std::clamp(ab.dot(r - a) / ab.squaredNorm(), 0.0, 1.0);
    return (r - a - s * ab).norm();
}

double longest_edge(const Corners& c) {
    return std::max({(c[1] - c[0]).norm(), (c[2] - c[1]).norm(), (c[0] - c[2]).norm()});
}

void append_radon(const Corners& c, int triangle, std::vector<OuterPoint>& out) {
    const double area = 0.5 * (c[1] - c[0]).cross(c[2] - c[0]).norm();
    static const TriangleRule rule = triangle_rule(5);
    for (Eigen::Index i = 0; i < rule.weights.size(); ++i)
        out.push_back({rule.points(i, 0) * c[0] + rule.points(i, 1) * c[1] + rule.points(i, 2) * c[2],
                       rule.weights[i] * area, triangle});
}

void bisect(const Corners& c, int triangle, const PlanarElement& source, int depth, std::vector<OuterPoint>& out) {
    const Vec3 centre = (c[0] + c[1] + c[2]) / 3;
    if (depth == 0 || longest_edge(c) < distance(source, centre)) return append_radon(c, triangle, out);
    std::size_t i = 0;
    for (std::size_t j = 1; j < 3; ++j)
        if ((c[(j + 1) % 3] - c[j]).norm() > (c[(i + 1) % 3] - c[i]).norm()) i = j;
    const Vec3 mid = (c[i] + c[(i + 1) % 3]) / 2;
    bisect({c[i], mid, c[(i + 2) % 3]}, triangle, source, depth - 1, out);
    bisect({mid, c[(i + 1) % 3], c[(i + 2) % 3]}, triangle, source, depth - 1, out);
}

}  // namespace

double distance(const PlanarElement& cell, const Vec3& r) {
    double least = 1e300;
    bool inside = true;
    const double height = cell.normal.dot(r - cell.corner[0]);
    for (int k = 0; k < cell.slots; ++k) {
        const Vec3 a = cell.edge_start(k), b = cell.edge_end(k);
        least = std::min(least, distance_to_segment(a, b, r));
        if ((b - a).cross(r - a).dot(cell.normal) < 0) inside = false;
    }
    return inside ? std::abs(height) : least;
}

double distance(const PlanarElement& a, const PlanarElement& b) {
    double least = 1e300;
    for (int i = 0; i < a.slots; ++i) least = std::min(least, distance(b, a.edge_start(i)));
    for (int i = 0; i < b.slots; ++i) least = std::min(least, distance(a, b.edge_start(i)));
    return least;
}

std::vector<OuterPoint> graded_rule(const PlanarElement& test, int points) {
    std::vector<OuterPoint> out;
    const LineRule rule = gauss_legendre(points, 0, 1);
    for (int k = 0; k < test.slots; ++k) {
        const double twice_area = 2 * test.triangle_area(k);
        for (Eigen::Index i = 0; i < points; ++i) {
            // eta from the apex to the outer edge: singular at the edge only, the apex ends in a spoke anyway.
            const double x = rule.nodes[i], eta = x * x * (3 - 2 * x), d_eta = 6 * x * (1 - x) * rule.weights[i];
            for (Eigen::Index j = 0; j < points; ++j) {
                const double y = rule.nodes[j], xi = y * y * (3 - 2 * y), d_xi = 6 * y * (1 - y) * rule.weights[j];
                const Vec3 on_edge = (1 - xi) * test.edge_start(k) + xi * test.edge_end(k);
                out.push_back({(1 - eta) * test.apex + eta * on_edge, twice_area * eta * d_eta * d_xi, k});
            }
        }
    }
    return out;
}

std::vector<OuterPoint> adaptive_rule(const PlanarElement& test, const PlanarElement& source, int depth) {
    std::vector<OuterPoint> out;
    for (int k = 0; k < test.slots; ++k)
        bisect({test.edge_start(k), test.edge_end(k), test.apex}, k, source, depth, out);
    return out;
}

}  // namespace annulet
