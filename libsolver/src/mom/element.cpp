#include "mom/element.hpp"

#include <Eigen/Geometry>
#include <Eigen/LU>

#include <algorithm>

namespace annulet {

namespace {

std::size_t at(int i) {
    return static_cast<std::size_t>(i);
}

double area(const Vec3& a, const Vec3& b, const Vec3& c) {
    return 0.5 * (b - a).cross(c - a).norm();
}

/// Constant part of the Raviart-Thomas function with outward fluxes `flux[j]` through the edges opposite to
/// corners `v[j]`: f = sum_j flux_j (r - v_j) / (2 area)  [RaviartThomas1977].
Vec3 constant_part(const std::array<Vec3, 3>& v, const std::array<double, 3>& flux) {
    const double twice = 2 * area(v[0], v[1], v[2]);
    return -(flux[0] * v[0] + flux[1] * v[1] + flux[2] * v[2]) / twice;
}

/// Adds half of the constants of the functions built on the diagonal corner[d] - corner[d+2]: the triangle on
/// its one side holds the edges d and d+1, the other d+2 and d+3.
void add_diagonal(PlanarElement& e, int d) {
    for (int side = 0; side < 2; ++side) {
        const int first = (d + 2 * side) % 4, second = (first + 1) % 4, third = (first + 2) % 4;
        const std::array<Vec3, 3> v{e.corner[at(first)], e.corner[at(second)], e.corner[at(third)]};
        const double share = area(v[0], v[1], v[2]) / e.area_m2;
        for (int slot = 0; slot < 4; ++slot) {
            // opposite to v0: edge `second`; to v1: the diagonal; to v2: edge `first`
            std::array<double, 3> flux{slot == second ? 1.0 : 0.0, 0.0, slot == first ? 1.0 : 0.0};
            flux[1] = share - flux[0] - flux[2];
            const Vec3 c = constant_part(v, flux);
            e.constant[at(first)][at(slot)] += 0.5 * c;
            e.constant[at(second)][at(slot)] += 0.5 * c;
        }
    }
}

void fill_quadrilateral(PlanarElement& e) {
    const Vec3 p = e.corner[2] - e.corner[0], q = e.corner[3] - e.corner[1];
    e.area_m2 = 0.5 * p.cross(q).norm();
    const Vec3 n = p.cross(q);
    const double s = (e.corner[1] - e.corner[0]).cross(q).dot(n) / n.squaredNorm();
    e.apex = e.corner[0] + s * p;
    for (auto& row : e.constant) row.fill(Vec3::Zero());
    add_diagonal(e, 0);
    add_diagonal(e, 1);
}

void fill_triangle(PlanarElement& e) {
    e.area_m2 = area(e.corner[0], e.corner[1], e.corner[2]);
    e.apex = (e.corner[0] + e.corner[1] + e.corner[2]) / 3;
    for (auto& row : e.constant)
        for (int slot = 0; slot < 3; ++slot) row[at(slot)] = -e.corner[at((slot + 2) % 3)] / (2 * e.area_m2);
}

}  // namespace

double PlanarElement::triangle_area(int k) const {
    return area(edge_start(k), edge_end(k), apex);
}

double PlanarElement::diameter() const {
    double longest = 0;
    for (int i = 0; i < slots; ++i)
        for (int j = 0; j < i; ++j) longest = std::max(longest, (corner[at(i)] - corner[at(j)]).norm());
    return longest;
}

PlanarElement PlanarElement::mirrored(double plane_z_m) const {
    PlanarElement image = *this;
    const auto point = [&](Vec3& p) { p.z() = 2 * plane_z_m - p.z(); };
    for (auto& p : image.corner) point(p);
    point(image.apex);
    // The corners keep their order, so the normal that sees them counter-clockwise is minus the mirrored one.
    image.normal = Vec3(-normal.x(), -normal.y(), normal.z());
    // f'(r) = M f(M r): with M r = D r + 2h z, D = diag(1, 1, -1): c' = D c + 2 h d z D = D c - 2 h d z
    for (auto& row : image.constant)
        for (auto& c : row) c = Vec3(c.x(), c.y(), -c.z() - 2 * plane_z_m * slope_per_m2);
    return image;
}

PlanarElement planar_element(const Element& element) {
    PlanarElement e;
    e.slots = element.corners();
    e.corner = element.corner;
    element.kind == CellKind::quadrilateral ? fill_quadrilateral(e) : fill_triangle(e);
    e.normal = (e.corner[1] - e.corner[0]).cross(e.corner[2] - e.corner[0]).normalized();
    e.slope_per_m2 = 1 / (2 * e.area_m2);
    return e;
}

PlanarElement planar_element(const Mesh& mesh, const Cell& cell) {
    Element element;
    element.kind = cell.kind;
    for (int i = 0; i < 4; ++i) element.corner[at(i)] = mesh.nodes[at(cell.node[at(i < cell.corners() ? i : 0)])];
    return planar_element(element);
}

MomentField moment_field(const PlanarElement& e) {
    MomentField field;
    for (int k = 0; k < e.slots; ++k)
        field.centroid += e.triangle_area(k) * (e.edge_start(k) + e.edge_end(k) + e.apex) / (3 * e.area_m2);
    std::array<Eigen::Matrix3d, 4> first;
    for (auto& m : first) m.setZero();
    for (auto& m : field.mean) m.setZero();
    Eigen::Matrix3d inertia = Eigen::Matrix3d::Zero();
    for (int k = 0; k < e.slots; ++k) {
        // Mid-edge rule: exact for the quadratic integrands here [Strang1973].
        const std::array<Vec3, 3> mid{(e.edge_start(k) + e.edge_end(k)) / 2, (e.edge_end(k) + e.apex) / 2,
                                      (e.apex + e.edge_start(k)) / 2};
        const double w = e.triangle_area(k) / (3 * e.area_m2);
        for (const Vec3& r : mid) {
            const Vec3 x = r - field.centroid;
            inertia += w * x * x.transpose();
            for (int slot = 0; slot < e.slots; ++slot) {
                field.mean[at(slot)] += w * e.value(k, slot, r);
                first[at(slot)] += w * e.value(k, slot, r) * x.transpose();
            }
        }
    }
    // The inertia tensor is singular along the normal, where x has no component: regularise that direction.
    inertia += inertia.trace() * e.normal * e.normal.transpose();
    const Eigen::Matrix3d inverse = inertia.inverse();
    for (int slot = 0; slot < e.slots; ++slot) field.gradient[at(slot)] = first[at(slot)] * inverse;
    return field;
}

}  // namespace annulet
