#include "mom/wire_pairs.hpp"

#include "mom/static_pairs.hpp"

#include <gtest/gtest.h>
#include <annulet/core/constants.hpp>
#include <annulet/mom/basis.hpp>
#include <annulet/numerics/quadrature.hpp>

#include <boost/math/quadrature/tanh_sinh.hpp>

namespace annulet {
namespace {

using constants::pi;

double kernel_by_mean(double d2, double a, double b) {
    constexpr int n = 4000;  // the trapezoidal rule on a period converges exponentially
    double sum = 0;
    for (int i = 0; i < n; ++i) sum += 1 / std::sqrt(d2 + a * a + b * b - 2 * a * b * std::cos(2 * pi * (i + 0.5) / n));
    return sum / n;
}

TEST(TubeKernel, IsTheMeanAroundTheTubes) {
    for (const auto& [d, a, b] : {std::tuple{0.05, 1.0, 1.0}, {3.0, 1.0, 1.0}, {0.0, 1.0, 2.0}, {40.0, 1.0, 0.3}})
        EXPECT_NEAR(tube_kernel(d * d, a, b) / kernel_by_mean(d * d, a, b), 1, 1e-12) << d;
}

/// Nested adaptive quadrature, cut where the segments come nearest.
double moment_by_brute_force(const WireElement& t, const WireElement& s, int a, int b) {
    boost::math::quadrature::tanh_sinh<double> rule(14);
    const double lengths = t.length_m() * s.length_m();
    const auto hat = [](int i, double u) { return i == 0 ? -(1 - u) : u; };
    const auto inner = [&](double x) {
        const Vec3 r = t.point(x);
        const double foot = (r - s.from).dot(s.to - s.from) / std::pow(s.length_m(), 2);
        // Distances from the foot keep their digits next to it.
        const double off2 = (r - s.point(foot)).squaredNorm();
        const auto part = [&](double sign, double from, double to) {
            if (to <= from) return 0.0;
            return rule.integrate(
                [&](double v, double vc) {
                    const double from_foot = from + (vc <= 0 ? -vc : (to - from) - vc);
                    (void)v;
                    return hat(b, foot + sign * from_foot) *
                           tube_kernel(off2 + std::pow(std::max(from_foot, 1e-300) * s.length_m(), 2) + 1e-300,
                                       t.radius_m, s.radius_m);
                },
                from, to, 1e-12);
        };
        if (foot <= 0) return part(1, -foot, 1 - foot);
        if (foot >= 1) return part(-1, foot - 1, foot);
        return part(1, 0, 1 - foot) + part(-1, 0, foot);
    };
    const double sum = rule.integrate([&](double x) { return hat(a, x) * inner(x); }, 0.0, 1.0, 1e-10);
    return sum * lengths * t.tangent().dot(s.tangent()) / (4 * pi);
}

void expect_exact(const WireElement& t, const WireElement& s) {
    const PairMoments m = static_wire_pair(t, s);
    double largest = 0;
    for (const auto& row : m.vector)
        for (double x : row) largest = std::max(largest, std::abs(x));
    for (int a = 0; a < 2; ++a)
        for (int b = 0; b < 2; ++b)
            EXPECT_NEAR(m.vector[static_cast<std::size_t>(a)][static_cast<std::size_t>(b)],
                        moment_by_brute_force(t, s, a, b), 1e-8 * largest)
                << a << b;
}

TEST(WirePairs, CoincidentThickAndThin) {
    for (double radius : {2.0, 0.3, 0.01, 1e-5}) {
        const WireElement w{{0, 0, 0}, {0, 0, 1}, radius};
        expect_exact(w, w);
    }
}

TEST(WirePairs, SharedEndStraightAndBent) {
    for (double radius : {1.0, 0.05, 1e-4})
        for (const Vec3& end : {Vec3(0, 0, 1.8), Vec3(0.5, 0, 0.2), Vec3(1, 0, -0.2)}) {
            const WireElement first{{0, 0, -1}, {0, 0, 0}, radius}, second{{0, 0, 0}, end, radius};
            expect_exact(first, second);
            expect_exact(second, {first.to, first.from, radius});
        }
}

TEST(WirePairs, UnequalTubesAndSeparateOnes) {
    expect_exact({{0, 0, -1}, {0, 0, 0}, 0.1}, {{0, 0, 0}, {0, 0, 1}, 0.25});
    expect_exact({{0, 0, -1}, {0, 0, 0}, 0.1}, {{0.3, 0, -2}, {0.3, 0.1, 1}, 0.1});
    expect_exact({{0, 0, -1}, {0, 0, 0}, 0.1}, {{0, 0, 0.02}, {0, 0, 1}, 0.1});
}

TEST(WirePairs, FarTubesSeeTheReducedKernel) {
    EXPECT_NEAR(tube_kernel(100, 0.5, 0.5) * std::sqrt(100.5), 1, 0.75 * std::pow(0.05, 4) * 1.1);
}

// The potential of a triangle averaged around the wire, against the product of plain Gauss rules: both cells apart.
TEST(WirePairs, WireBesideTriangleByQuadrature) {
    Mesh mesh;
    mesh.nodes = {{0, 0, 0}, {1, 0, 0}, {0.2, 0.8, 0}};
    Cell plate;
    plate.kind = CellKind::triangle;
    plate.node = {0, 1, 2, -1};
    mesh.cells = {plate};
    const PlanarElement surface = planar_element(mesh, plate);
    const WireElement wire{{0.2, 0.3, 0.25}, {1.4, 0.5, 0.9}, 0.1};
    const PairMoments m = static_wire_and_surface(wire, surface);
    const LineRule rule = gauss_legendre(24, 0, 1);
    double scalar = 0, vector = 0;
    const Vec3 t = wire.tangent(), side = t.unitOrthogonal(), other = t.cross(side);
    for (int i = 0; i < 24; ++i)
        for (int around = 0; around < 8; ++around)
            for (int j = 0; j < 24; ++j)
                for (int k = 0; k < 24; ++k) {
                    const double psi = 2 * pi * (around + 0.3) / 8, u = rule.nodes[j], v = rule.nodes[k];
                    const Vec3 p = wire.point(rule.nodes[i]) + 0.1 * (std::cos(psi) * side + std::sin(psi) * other);
                    const Vec3 q = (1 - u) * mesh.nodes[0] + u * ((1 - v) * mesh.nodes[1] + v * mesh.nodes[2]);
                    const double g =
                        2 * u * rule.weights[i] * rule.weights[j] * rule.weights[k] / 8 / (4 * pi * (p - q).norm());
                    scalar += g;
                    vector +=
                        g * wire.length_m() * surface.area_m2 * rule.nodes[i] * t.dot(local_function(mesh, 0, 1, q));
                }
    EXPECT_NEAR(m.scalar / scalar, 1, 1e-6);
    EXPECT_NEAR(m.vector[1][1] / vector, 1, 1e-6);
    EXPECT_EQ(transposed(m).vector[1][0], m.vector[0][1]);
}

// The vertical flux of a layer couples with what of the wire is upright; far away as two points do, and from the image
// with the opposite sign.
TEST(WirePairs, UprightWireAndVerticalFluxOfALayer) {
    std::vector<Element> elements(2);
    elements[0].kind = CellKind::segment;
    elements[0].corner = {Vec3(0, 0, 20), Vec3(0, 0, 21), Vec3::Zero(), Vec3::Zero()};
    elements[0].radius_m = 0.01;
    elements[1].role = ElementRole::layer;
    elements[1].corner = {Vec3(20, 0, 5), Vec3(20.1, 0, 5), Vec3(20.1, 0.1, 5), Vec3(20, 0.1, 5)};
    elements[1].thickness_m = 0.3;
    const StaticPairs pairs(elements, 0.0);
    const PairMoments m = pairs.moments(0, 1, false), back = pairs.moments(1, 0, false);
    const double point = 0.3 * 0.5 / (4 * pi * std::hypot(20.05, 15.5));
    EXPECT_NEAR(m.vector[1][4] / point, 1, 0.02);
    EXPECT_NEAR(m.vector[0][4] / -point, 1, 0.02);
    EXPECT_NEAR(back.vector[4][1] / m.vector[1][4], 1, 1e-12);
    // The image of the layer lies at z = -5 and its flux points down; the image of the wire likewise.
    const PairMoments image = pairs.moments(0, 1, true), other = pairs.moments(1, 0, true);
    EXPECT_NEAR(image.vector[1][4] / (-0.3 * 0.5 / (4 * pi * std::hypot(20.05, 25.5))), 1, 0.02);
    EXPECT_NEAR(other.vector[4][1] / image.vector[1][4], 1, 1e-6);
}

}  // namespace
}  // namespace annulet
