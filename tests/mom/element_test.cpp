#include "mom/element.hpp"

#include <gtest/gtest.h>
#include <annulet/mom/basis.hpp>

#include "support/test_meshes.hpp"

namespace annulet {
namespace {

Mesh one_cell(const std::vector<Vec3>& corners) {
    Mesh mesh;
    mesh.nodes = corners;
    Cell cell;
    cell.kind = corners.size() == 4 ? CellKind::quadrilateral : CellKind::triangle;
    for (std::size_t i = 0; i < corners.size(); ++i) cell.node[i] = static_cast<int>(i);
    mesh.cells.push_back(cell);
    return mesh;
}

const std::vector<Vec3> skew{{0.1, 0.2, 0.3}, {1.4, 0.1, 0.3}, {1.1, 0.9, 0.3}, {0.3, 1.3, 0.3}};

/// Outward flux density of a slot at the middle of edge k.
double normal_flux(const PlanarElement& e, int k, int slot, double along) {
    const Vec3 r = (1 - along) * e.edge_start(k) + along * e.edge_end(k);
    const Vec3 outward = (e.edge_end(k) - e.edge_start(k)).cross(e.normal);
    return e.value(k, slot, r).dot(outward);
}

// Raviart & Thomas 1977: unit flux through one's own edge, constant along it, none through the others.
TEST(Element, UnitFluxThroughOwnEdgeOnly) {
    for (const auto& corners : {skew, std::vector<Vec3>(skew.begin(), skew.begin() + 3)}) {
        const Mesh mesh = one_cell(corners);
        const PlanarElement e = planar_element(mesh, mesh.cells[0]);
        for (int slot = 0; slot < e.slots; ++slot)
            for (int k = 0; k < e.slots; ++k)
                for (double along : {0.1, 0.5, 0.8})
                    EXPECT_NEAR(normal_flux(e, k, slot, along), k == slot ? 1.0 : 0.0, 1e-13);
    }
}

// The normal component is continuous across the spokes of the fan (div-conforming inside the cell).
TEST(Element, NormalContinuousAcrossSpokes) {
    const Mesh mesh = one_cell(skew);
    const PlanarElement e = planar_element(mesh, mesh.cells[0]);
    for (int slot = 0; slot < 4; ++slot)
        for (int k = 0; k < 4; ++k) {
            const Vec3 r = 0.3 * e.apex + 0.7 * e.edge_start(k);
            const Vec3 n = (e.apex - e.edge_start(k)).cross(e.normal);
            EXPECT_NEAR((e.value(k, slot, r) - e.value((k + 3) % 4, slot, r)).dot(n), 0, 1e-13);
        }
}

TEST(Element, ReproducesConstantFields) {
    const Mesh mesh = one_cell(skew);
    const PlanarElement e = planar_element(mesh, mesh.cells[0]);
    const Vec3 field(0.7, -1.3, 0);
    const MomentField whole = moment_field(e);
    Vec3 mean = Vec3::Zero();
    for (int k = 0; k < 4; ++k) {
        const Vec3 r = (e.edge_start(k) + e.edge_end(k) + e.apex) / 3;
        Vec3 sum = Vec3::Zero();
        for (int slot = 0; slot < 4; ++slot) {
            const Vec3 outward = (e.edge_end(slot) - e.edge_start(slot)).cross(e.normal);
            sum += field.dot(outward) * e.value(k, slot, r);
            if (k == 0) mean += field.dot(outward) * whole.mean[static_cast<std::size_t>(slot)];
        }
        EXPECT_LT((sum - field).norm(), 1e-13);
    }
    EXPECT_LT((mean - field).norm(), 1e-13);
}

// On a rectangle the moment field is the rooftop: f = x / (w h) along x for the edge at x = w.
TEST(Element, MomentFieldIsRooftopOnRectangle) {
    const Mesh mesh = one_cell({{0, 0, 0}, {2, 0, 0}, {2, 0.5, 0}, {0, 0.5, 0}});
    const MomentField f = moment_field(planar_element(mesh, mesh.cells[0]));
    const Vec3 r(1.7, 0.1, 0);
    const Vec3 value = f.mean[1] + f.gradient[1] * (r - f.centroid);
    EXPECT_LT((value - Vec3(1.7, 0, 0)).norm(), 1e-13);
}

TEST(Element, MirrorImageMirrorsFields) {
    const Mesh mesh = one_cell({{0, 0, 0.2}, {1, 0, 0.4}, {1, 1, 0.4}, {0, 1, 0.2}});
    const PlanarElement e = planar_element(mesh, mesh.cells[0]), image = e.mirrored(-0.1);
    const Vec3 r = 0.5 * (e.corner[0] + e.apex), mirrored(r.x(), r.y(), -0.2 - r.z());
    for (int slot = 0; slot < 4; ++slot) {
        const Vec3 f = e.value(0, slot, r), g = image.value(0, slot, mirrored);
        EXPECT_LT((g - Vec3(f.x(), f.y(), -f.z())).norm(), 1e-13);
    }
}

// Charge neutrality: every function carries +1 and -1; n cells at an edge give n - 1 functions.
TEST(Basis, CountsEdgesAndJunctions) {
    const Basis ring = make_basis(test::annulus(0.9, 1, 12, test::uniform_nodes(3)));
    EXPECT_EQ(ring.unknowns, 12 * 3 + 12 * 2);
    EXPECT_NEAR(Eigen::VectorXd(ring.divergence.transpose() * Eigen::VectorXd::Ones(ring.divergence.rows())).norm(), 0,
                0);
    Mesh tee;  // three triangles at one edge
    tee.nodes = {{0, 0, 0}, {0, 0, 1}, {1, 0, 0}, {-1, 0, 0}, {0, 1, 0}};
    for (int tip : {2, 3, 4}) {
        Cell c;
        c.kind = CellKind::triangle;
        c.node = {0, 1, tip, -1};
        tee.cells.push_back(c);
    }
    EXPECT_EQ(make_basis(tee).unknowns, 2);
}

}  // namespace
}  // namespace annulet
