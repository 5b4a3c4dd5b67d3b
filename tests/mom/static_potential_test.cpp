#include "mom/static_potential.hpp"

#include <gtest/gtest.h>
#include <annulet/mom/operator.hpp>
#include <annulet/numerics/quadrature.hpp>

#include "mom/outer_rule.hpp"
#include "mom/static_pairs.hpp"
#include "support/test_meshes.hpp"

namespace annulet {
namespace {

/// Reference: fan triangles bisected until smaller than a third of their distance to r, 16-point rule [Dunavant1985].
void reference(const Vec3& a, const Vec3& b, const Vec3& c, const Vec3& r, int depth, double& scalar, Vec3& vector) {
    const double size = std::max({(b - a).norm(), (c - b).norm(), (a - c).norm()});
    if (depth > 0 && size > ((a + b + c) / 3 - r).norm() / 3) {
        const Vec3 ab = (a + b) / 2, bc = (b + c) / 2, ca = (c + a) / 2;
        reference(a, ab, ca, r, depth - 1, scalar, vector);
        reference(ab, b, bc, r, depth - 1, scalar, vector);
        reference(ca, bc, c, r, depth - 1, scalar, vector);
        reference(ab, bc, ca, r, depth - 1, scalar, vector);
        return;
    }
    const double area = 0.5 * (b - a).cross(c - a).norm();
    static const TriangleRule rule = triangle_rule(8);
    for (Eigen::Index i = 0; i < rule.weights.size(); ++i) {
        const Vec3 p = rule.points(i, 0) * a + rule.points(i, 1) * b + rule.points(i, 2) * c;
        const double g = rule.weights[i] * area / (p - r).norm();
        scalar += g;
        vector += g * p;
    }
}

void expect_potential(const PlanarElement& e, const Vec3& r) {
    const CellPotential v = static_potential(e, r);
    Vec3 vector = Vec3::Zero();
    double total = 0;
    for (int k = 0; k < e.slots; ++k) {
        double scalar = 0;
        reference(e.edge_start(k), e.edge_end(k), e.apex, r, 17, scalar, vector);
        total += scalar;
        if (e.slots == 4) {
            EXPECT_NEAR(v.scalar[static_cast<std::size_t>(k)], scalar, 2e-5 * total) << r.transpose();
        }
    }
    EXPECT_NEAR(v.scalar[0] + v.scalar[1] + v.scalar[2] + v.scalar[3], total, 2e-5 * total);
    EXPECT_LT((v.vector - vector).norm(), 2e-5 * vector.norm());
}

TEST(StaticPotential, AgreesWithAdaptiveQuadrature) {
    Mesh mesh;
    mesh.nodes = {{0, 0, 0}, {1.2, 0.1, 0}, {1, 0.6, 0}, {0.1, 0.5, 0}};
    Cell quad, triangle;
    quad.node = {0, 1, 2, 3};
    triangle.kind = CellKind::triangle;
    triangle.node = {0, 1, 2, -1};
    for (const Cell& cell : {quad, triangle}) {
        const PlanarElement e = planar_element(mesh, cell);
        for (const Vec3& r : {Vec3(0.5, 0.3, 0), Vec3(0.5, 0.3, 0.01), Vec3(2, 1, 0), Vec3(-0.3, 0.05, -0.4),
                              Vec3(0.55, 0.55, 0), Vec3(0.6, 0.3, 3)})
            expect_potential(e, r);
    }
}

// At a corner and on an edge line the closed form has removable singularities: the limit is approached from beside.
TEST(StaticPotential, ContinuousAtEdgesAndCorners) {
    Mesh mesh;
    mesh.nodes = {{0, 0, 0}, {1, 0, 0}, {1, 1, 0}, {0, 1, 0}};
    Cell quad;
    quad.node = {0, 1, 2, 3};
    const PlanarElement e = planar_element(mesh, quad);
    for (const Vec3& r : {Vec3(0, 0, 0), Vec3(0.5, 0, 0), Vec3(-1, 0, 0), Vec3(0.25, 0.25, 0), Vec3(0.5, 0.5, 0)}) {
        const CellPotential at = static_potential(e, r), beside = static_potential(e, r + Vec3(1e-9, 2e-9, 1e-9));
        for (std::size_t k = 0; k < 4; ++k) EXPECT_NEAR(at.scalar[k], beside.scalar[k], 1e-6);
        EXPECT_LT((at.vector - beside.vector).norm(), 1e-6);
    }
    // Centre of the unit square: 4 ln(1 + sqrt 2) (elementary integral).
    double total = 0;
    for (double s : static_potential(e, Vec3(0.5, 0.5, 0)).scalar) total += s;
    EXPECT_NEAR(total, 4 * std::log(1 + std::sqrt(2.0)), 1e-14);
}

// Mutual and self potential of uniformly charged coplanar unit squares, closed form of the four-fold integral of
// 1/R (elementary; for the square itself (4 pi) times 0.2366..., e.g. Higgins & Reitan, AIEE Trans. 70, 1951):
// integral over both squares of 1/R = 4 (ln(1 + sqrt 2) + (1 - sqrt 2) / 3).
TEST(StaticMoments, SelfTermOfSquare) {
    Mesh mesh;
    mesh.nodes = {{0, 0, 0}, {1, 0, 0}, {1, 1, 0}, {0, 1, 0}};
    Cell quad;
    quad.node = {0, 1, 2, 3};
    mesh.cells = {quad};
    const auto elements = make_elements(mesh);
    const double exact = 4 * (std::log(1 + std::sqrt(2.0)) + (1 - std::sqrt(2.0)) / 3);
    const PairMoments m = StaticPairs(elements, {}).moments(0, 0, false);
    EXPECT_NEAR(m.scalar * 4 * 3.14159265358979324 / exact, 1, 3e-6);
    for (std::size_t a = 0; a < 4; ++a)
        for (std::size_t b = 0; b < a; ++b) EXPECT_NEAR(m.vector[a][b], m.vector[b][a], 3e-6 * m.vector[a][a]);
}

TEST(OuterRule, WeightsSumToArea) {
    const Mesh mesh = test::annulus(0.5, 1, 10, test::edge_nodes(0.06));
    const PlanarElement a = planar_element(mesh, mesh.cells[0]), b = planar_element(mesh, mesh.cells[7]);
    for (const auto& rule : {graded_rule(a, 8), adaptive_rule(a, b, 8)}) {
        double sum = 0;
        for (const OuterPoint& p : rule) sum += p.weight_m2;
        EXPECT_NEAR(sum, a.area_m2, 1e-13 * a.area_m2);
    }
}

}  // namespace
}  // namespace annulet
