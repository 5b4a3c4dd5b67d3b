#include <annulet/core/constants.hpp>
#include <annulet/numerics/quadrature.hpp>

#include <fmt/format.h>

#include <array>
#include <cassert>
#include <cmath>
#include <stdexcept>
#include <utility>
#include <vector>

namespace annulet {

namespace {

struct Legendre {
    double value;
    double derivative;
};

// P_n and P_n' by the three-term recurrence.
Legendre legendre(int n, double x) {
    double previous = 1;
    double current = x;
    for (int k = 2; k <= n; ++k) {
        const double next = ((2 * k - 1) * x * current - (k - 1) * previous) / k;
        previous = current;
        current = next;
    }
    return {current, n * (x * current - previous) / (x * x - 1)};
}

// The i-th largest root of P_n by Newton from the asymptotic estimate of Tricomi; three or four steps.
double legendre_root(int n, int i) {
    double x = std::cos(constants::pi * (i + 0.75) / (n + 0.5)) * (1 - (1 - 1.0 / n) / (8.0 * n * n));
    for (int step = 0; step < 10; ++step) {
        const Legendre p = legendre(n, x);
        const double dx = p.value / p.derivative;
        x -= dx;
        if (std::abs(dx) < 1e-15) break;
    }
    return x;
}

// Points of a triangle that are images of one another under its symmetries.
struct Orbit {
    double weight;  // of each point
    double a, b;    // two barycentric coordinates
};

std::vector<std::array<double, 3>> images(const Orbit& orbit) {
    const double a = orbit.a;
    const double b = orbit.b;
    const double c = 1 - a - b;
    if (a == b && std::abs(b - c) < 1e-15) return {{a, b, c}};
    if (std::abs(b - c) < 1e-14) return {{a, b, b}, {b, a, b}, {b, b, a}};
    return {{a, b, c}, {b, c, a}, {c, a, b}, {b, a, c}, {a, c, b}, {c, b, a}};
}

TriangleRule assemble(const std::vector<Orbit>& orbits) {
    std::vector<std::pair<std::array<double, 3>, double>> all;
    for (const Orbit& orbit : orbits)
        for (const auto& image : images(orbit)) all.emplace_back(image, orbit.weight);
    TriangleRule rule{Eigen::MatrixX3d(all.size(), 3), Eigen::VectorXd(all.size())};
    Eigen::Index row = 0;
    for (const auto& [point, weight] : all) {
        rule.points.row(row) << point[0], point[1], point[2];
        rule.weights(row++) = weight;
    }
    return rule;
}

// a and the weight of a three-point orbit (a, b, b).
Orbit three(double weight, double a) {
    return {weight, a, (1 - a) / 2};
}

std::vector<Orbit> radon_orbits() {
    const double root = std::sqrt(15.0);
    return {{9.0 / 40, 1.0 / 3, 1.0 / 3},
            three((155 - root) / 1200, (9 + 2 * root) / 21),
            three((155 + root) / 1200, (9 - 2 * root) / 21)};
}

// [Dunavant1985], table II.
std::vector<Orbit> dunavant8_orbits() {
    return {{0.144315607677787, 1.0 / 3, 1.0 / 3},
            three(0.095091634267285, 0.081414823414554),
            three(0.103217370534718, 0.658861384496480),
            three(0.032458497623198, 0.898905543365938),
            {0.027230314174435, 0.008394777409958, 0.263112829634638}};
}

}  // namespace

LineRule gauss_legendre(int n, double a, double b) {
    assert(n >= 1);
    LineRule rule{Eigen::VectorXd(n), Eigen::VectorXd(n)};
    const double half = (b - a) / 2;
    const double middle = (a + b) / 2;
    for (int i = 0; i < (n + 1) / 2; ++i) {
        const double x = 2 * i + 1 == n ? 0.0 : legendre_root(n, i);
        const double slope = legendre(n, x).derivative;
        const double weight = half * 2 / ((1 - x * x) * slope * slope);
        rule.nodes(i) = middle - half * x;
        rule.nodes(n - 1 - i) = middle + half * x;
        rule.weights(i) = rule.weights(n - 1 - i) = weight;
    }
    return rule;
}

SquareRule gauss_square(int n_s, int n_t) {
    const LineRule s = gauss_legendre(n_s, 0, 1);
    const LineRule t = gauss_legendre(n_t, 0, 1);
    SquareRule rule{Eigen::MatrixX2d(n_s * n_t, 2), Eigen::VectorXd(n_s * n_t)};
    for (int i = 0; i < n_s; ++i)
        for (int j = 0; j < n_t; ++j) {
            rule.points.row(i * n_t + j) << s.nodes(i), t.nodes(j);
            rule.weights(i * n_t + j) = s.weights(i) * t.weights(j);
        }
    return rule;
}

TriangleRule triangle_rule(int degree) {
    if (degree < 0 || degree > 8)
        throw std::invalid_argument(fmt::format("no triangle rule of degree {}: 0 to 8 are known", degree));
    if (degree <= 1) return assemble({{1, 1.0 / 3, 1.0 / 3}});
    if (degree == 2) return assemble({three(1.0 / 3, 2.0 / 3)});
    if (degree <= 4)
        return assemble(
            {three(0.223381589678011466, 0.108103018168070228), three(0.109951743655321868, 0.816847572980458514)});
    if (degree == 5) return assemble(radon_orbits());
    return assemble(dunavant8_orbits());
}

SphereRule sphere_rule(int n) {
    const LineRule cosines = gauss_legendre(n);
    SphereRule rule{Eigen::MatrixX3d(2 * n * n, 3), Eigen::VectorXd(2 * n * n)};
    for (int i = 0; i < n; ++i) {
        const double z = cosines.nodes(i);
        const double rho = std::sqrt((1 - z) * (1 + z));
        for (int j = 0; j < 2 * n; ++j) {
            const double phi = constants::pi * j / n;
            rule.directions.row(2 * n * i + j) << rho * std::cos(phi), rho * std::sin(phi), z;
            rule.weights(2 * n * i + j) = cosines.weights(i) * constants::pi / n;
        }
    }
    return rule;
}

Eigen::VectorXd chebyshev_nodes(int n, double a, double b) {
    assert(n >= 1);
    Eigen::VectorXd nodes(n);
    for (int j = 0; j < n; ++j)
        nodes(j) = (a + b) / 2 - (b - a) / 2 * std::cos(constants::pi * (2 * j + 1) / (2.0 * n));
    return nodes;
}

Interpolation::Interpolation(Eigen::VectorXd nodes) : nodes_(std::move(nodes)), weights_(nodes_.size()) {
    // Differences over a quarter of the interval (its capacity) keep the products of many factors near one.
    const double scale = nodes_.size() > 1 ? 4 / (nodes_.maxCoeff() - nodes_.minCoeff()) : 1.0;
    for (Eigen::Index j = 0; j < nodes_.size(); ++j) {
        double product = 1;
        for (Eigen::Index i = 0; i < nodes_.size(); ++i)
            if (i != j) product *= (nodes_(j) - nodes_(i)) * scale;
        weights_(j) = 1 / product;
    }
}

Eigen::VectorXd Interpolation::basis(double x) const {
    Eigen::VectorXd terms(nodes_.size());
    for (Eigen::Index j = 0; j < nodes_.size(); ++j) {
        if (x == nodes_(j)) return Eigen::VectorXd::Unit(nodes_.size(), j);
        terms(j) = weights_(j) / (x - nodes_(j));
    }
    return terms / terms.sum();
}

}  // namespace annulet
