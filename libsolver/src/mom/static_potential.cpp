#include "mom/static_potential.hpp"

#include <Eigen/Geometry>

#include <cmath>

namespace annulet {

namespace {

/// Contribution of one directed edge whose polygon lies to the left of it seen against the normal.
struct EdgeTerm {
    double scalar = 0;     ///< to the integral of 1/R
    Vec3 vector{0, 0, 0};  ///< to the integral of (rho' - rho)/R
};

/// ln((R+ + l+)/(R- + l-)), R^2 = l^2 + R0^2, in the form that cancels nowhere: R + l = R0^2 / (R - l).
double logarithm(double l_minus, double l_plus, double r_minus, double r_plus, double r0_squared) {
    if (l_plus < 0) return std::log((r_minus - l_minus) / (r_plus - l_plus));
    if (l_minus < 0) return std::log((r_plus + l_plus) * (r_minus - l_minus) / r0_squared);
    return std::log((r_plus + l_plus) / (r_minus + l_minus));
}

/// [Wilton1984] (4) and (5): P0 u -> t, l, R as there; d is the height over the plane, `foot` the projection of r.
EdgeTerm edge_term(const Vec3& from, const Vec3& to, const Vec3& normal, const Vec3& foot, double d) {
    const Vec3 l_hat = (to - from).normalized();
    const Vec3 u_hat = l_hat.cross(normal);
    const double t = u_hat.dot(from - foot);
    const double l_minus = l_hat.dot(from - foot), l_plus = l_hat.dot(to - foot);
    const double r0_squared = t * t + d * d;
    const double r_minus = std::sqrt(l_minus * l_minus + r0_squared), r_plus = std::sqrt(l_plus * l_plus + r0_squared);
    const double scale = l_plus - l_minus;
    EdgeTerm term;
    double f = 0;
    if (r0_squared > 1e-24 * scale * scale) {
        f = logarithm(l_minus, l_plus, r_minus, r_plus, r0_squared);
        term.scalar = t * f;
        if (d != 0)
            term.scalar -= d * (std::atan(t * l_plus / (r0_squared + d * r_plus)) -
                                std::atan(t * l_minus / (r0_squared + d * r_minus)));
    }
    term.vector = 0.5 * u_hat * (r0_squared * f + l_plus * r_plus - l_minus * r_minus);
    return term;
}

}  // namespace

CellPotential static_potential(const PlanarElement& source, const Vec3& r) {
    const double height = source.normal.dot(r - source.corner[0]);
    const Vec3 foot = r - height * source.normal;
    const double d = std::abs(height);
    CellPotential potential;
    double total = 0;
    std::array<double, 4> spoke{};
    const bool fan = source.slots == 4;
    for (int k = 0; k < source.slots; ++k) {
        const auto i = static_cast<std::size_t>(k);
        const EdgeTerm edge = edge_term(source.edge_start(k), source.edge_end(k), source.normal, foot, d);
        potential.scalar[i] = edge.scalar;
        potential.vector += edge.vector;
        if (fan) spoke[i] = edge_term(source.edge_start(k), source.apex, source.normal, foot, d).scalar;
    }
    if (fan) {
        for (std::size_t i = 0; i < 4; ++i) potential.scalar[i] += spoke[(i + 1) % 4] - spoke[i];
    } else {  // one affine piece: only the sum matters
        potential.scalar = {potential.scalar[0] + potential.scalar[1] + potential.scalar[2], 0, 0, 0};
    }
    for (double s : potential.scalar) total += s;
    potential.vector += total * foot;
    return potential;
}

double static_charge_potential(const PlanarElement& source, const Vec3& r) {
    const double height = source.normal.dot(r - source.corner[0]);
    const Vec3 foot = r - height * source.normal;
    double sum = 0;
    for (int k = 0; k < source.slots; ++k)
        sum += edge_term(source.edge_start(k), source.edge_end(k), source.normal, foot, std::abs(height)).scalar;
    return sum;
}

}  // namespace annulet
