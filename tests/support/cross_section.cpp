#include "support/cross_section.hpp"

#include <annulet/core/constants.hpp>
#include <annulet/core/vec3.hpp>

#include <Eigen/LU>

#include <cmath>
#include <vector>

namespace annulet::test {

namespace {

using constants::pi;

struct Panel {
    Vec2 from, to;
    bool metal;
    Vec2 tangent() const { return (to - from).normalized(); }
    Vec2 outward() const { return {tangent().y(), -tangent().x()}; }  // outline counter-clockwise
    double length() const { return (to - from).norm(); }
    Vec2 middle() const { return 0.5 * (from + to); }
};

/// Potential -(1/2 pi) integral of ln r of a unit charge density.
double potential(const Panel& s, const Vec2& p) {
    const double u = s.tangent().dot(p - s.from), v = std::abs(s.outward().dot(p - s.from));
    const auto f = [&](double x) {
        const double r2 = x * x + v * v;
        return (r2 > 0 ? 0.5 * x * std::log(r2) : 0) - x + (v > 0 ? v * std::atan(x / v) : 0);
    };
    return -(f(s.length() - u) - f(-u)) / (2 * pi);
}

Vec2 field(const Panel& s, const Vec2& p) {
    const double u = s.tangent().dot(p - s.from), v = s.outward().dot(p - s.from), w = s.length() - u;
    const double along = 0.5 * std::log((u * u + v * v) / (w * w + v * v));
    const double across = std::abs(v) < 1e-12 * s.length() ? 0 : std::atan(w / v) + std::atan(u / v);
    return (along * s.tangent() + across * s.outward()) / (2 * pi);
}

void add_line(std::vector<Panel>& out, const Vec2& a, const Vec2& b, int n, bool metal) {
    const auto x = [&](int i) { return 0.5 - 0.5 * std::cos(pi * i / n); };
    for (int i = 0; i < n; ++i) out.push_back({a + x(i) * (b - a), a + x(i + 1) * (b - a), metal});
}

std::vector<Panel> outline(double width, double thickness, double margin, int n) {
    const double w = width / 2, rim = w + margin;
    std::vector<Panel> out;
    if (margin > 0) add_line(out, {rim, 0}, {w, 0}, n, false);
    add_line(out, {w, 0}, {-w, 0}, n, true);
    if (margin > 0) add_line(out, {-w, 0}, {-rim, 0}, n, false);
    add_line(out, {-rim, 0}, {-rim, -thickness}, n, false);
    add_line(out, {-rim, -thickness}, {rim, -thickness}, n, false);
    add_line(out, {rim, -thickness}, {rim, 0}, n, false);
    return out;
}

}  // namespace

double equivalent_radius_m(double width_m, double thickness_m, double margin_m, double permittivity, int panels) {
    const auto p = outline(width_m, thickness_m, margin_m, panels);
    const auto n = static_cast<Eigen::Index>(p.size());
    Eigen::MatrixXd a(n, n);
    Eigen::VectorXd b(n), length(n);
    for (Eigen::Index i = 0; i < n; ++i) {
        const Panel& at = p[static_cast<std::size_t>(i)];
        b[i] = at.metal ? 1 : 0;
        length[i] = at.length();
        for (Eigen::Index j = 0; j < n; ++j) {
            const Panel& from = p[static_cast<std::size_t>(j)];
            const double normal = i == j || at.metal ? 0 : at.outward().dot(field(from, at.middle()));
            a(i, j) = at.metal ? potential(from, at.middle())
                               : (i == j ? 0.5 * (1 + permittivity) : 0) - (permittivity - 1) * normal;
        }
    }
    const double charge = length.dot(a.partialPivLu().solve(b));  // 1 = -(charge / 2 pi) ln radius
    return std::exp(-2 * pi / charge);
}

}  // namespace annulet::test
