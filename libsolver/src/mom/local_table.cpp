#include "mom/local_table.hpp"

#include <annulet/numerics/quadrature.hpp>

#include <algorithm>
#include <cmath>

#include "mom/element.hpp"

namespace annulet {

namespace {

std::size_t at(int i) {
    return static_cast<std::size_t>(i);
}

struct SurfacePoint {
    Vec3 position;
    double weight_m2;
};

std::vector<SurfacePoint> surface_points(const PlanarElement& e, bool fine) {
    std::vector<SurfacePoint> out;
    if (e.slots == 3) {
        const TriangleRule rule = triangle_rule(fine ? 4 : 2);
        for (Eigen::Index i = 0; i < rule.weights.size(); ++i)
            out.push_back(
                {rule.points(i, 0) * e.corner[0] + rule.points(i, 1) * e.corner[1] + rule.points(i, 2) * e.corner[2],
                 rule.weights[i] * e.area_m2});
        return out;
    }
    const LineRule rule = gauss_legendre(fine ? 3 : 2, 0, 1);
    for (Eigen::Index i = 0; i < rule.nodes.size(); ++i)
        for (Eigen::Index j = 0; j < rule.nodes.size(); ++j) {
            const double u = rule.nodes[i], v = rule.nodes[j];
            const Vec3 r = (1 - u) * (1 - v) * e.corner[0] + u * (1 - v) * e.corner[1] + u * v * e.corner[2] +
                           (1 - u) * v * e.corner[3];
            const Vec3 du = (1 - v) * (e.corner[1] - e.corner[0]) + v * (e.corner[2] - e.corner[3]);
            const Vec3 dv = (1 - u) * (e.corner[3] - e.corner[0]) + u * (e.corner[2] - e.corner[1]);
            out.push_back({r, du.cross(dv).norm() * rule.weights[i] * rule.weights[j]});
        }
    return out;
}

void fill_surface(LocalTable& table, int lane, const PlanarElement& e, double thickness_m, bool fine) {
    const auto points = surface_points(e, fine);
    const MomentField f = moment_field(e);
    const int lateral = std::min(table.slots, e.slots);
    for (int j = 0; j < table.points; ++j) {
        const SurfacePoint& p = points[at(j)];
        table.charge_at(j, lane) = p.weight_m2 / e.area_m2;
        for (int axis = 0; axis < 3; ++axis) table.position_at(j, axis, lane) = p.position[axis];
        if (table.slots > e.slots) table.field_at(e.slots, j, 2, lane) = table.charge_at(j, lane) * thickness_m;
        for (int slot = 0; slot < lateral; ++slot) {
            const Vec3 value = f.mean[at(slot)] + f.gradient[at(slot)] * (p.position - f.centroid);
            for (int axis = 0; axis < 3; ++axis) table.field_at(slot, j, axis, lane) = p.weight_m2 * value[axis];
        }
    }
}

void fill_segment(LocalTable& table, int lane, const Element& element) {
    const Vec3 &a = element.corner[0], &b = element.corner[1];
    const double length = (b - a).norm();
    const Vec3 tangent = (b - a) / length;
    const LineRule rule = gauss_legendre(table.points, 0, 1);
    for (int j = 0; j < table.points; ++j) {
        const double u = rule.nodes[j], w = rule.weights[j];
        table.charge_at(j, lane) = w;
        for (int axis = 0; axis < 3; ++axis) {
            table.position_at(j, axis, lane) = a[axis] + u * (b[axis] - a[axis]);
            table.field_at(0, j, axis, lane) = -w * length * (1 - u) * tangent[axis];
            table.field_at(1, j, axis, lane) = w * length * u * tangent[axis];
        }
    }
    table.radius2[at(lane)] = element.radius_m * element.radius_m;
}

int points_per_cell(CellKind kind, bool fine) {
    switch (kind) {
        case CellKind::quadrilateral:
            return fine ? 9 : 4;
        case CellKind::triangle:
            return fine ? 6 : 3;
        case CellKind::segment:
            return fine ? 4 : 2;
    }
    return 0;
}

void allocate(LocalTable& t) {
    t.lanes = static_cast<int>(t.element.size());
    t.position.assign(at(t.points * 3) * t.element.size(), 0);
    t.field.assign(at(t.slots * t.points * 3) * t.element.size(), 0);
    t.charge.assign(at(t.points) * t.element.size(), 0);
    t.radius2.assign(t.element.size(), 0);
}

/// A component counts as zero where it is rounding only.
void set_active(LocalTable& t) {
    for (int slot = 0; slot < t.slots; ++slot) {
        std::array<double, 3> largest{};
        for (int row = 0; row < t.points * 3; ++row)
            for (int lane = 0; lane < t.lanes; ++lane) {
                double& most = largest[at(row % 3)];
                most = std::max(most, std::abs(t.field[t.index(slot * t.points * 3 + row, lane)]));
            }
        const double scale = *std::max_element(largest.begin(), largest.end());
        for (std::size_t axis = 0; axis < 3; ++axis) t.active[at(slot)][axis] = largest[axis] > 1e-12 * scale;
    }
}

/// Rows of `from` at the chosen lanes.
std::vector<double> pick(const LocalTable& t, const std::vector<double>& from, const std::vector<int>& lanes) {
    const std::size_t rows = t.lanes == 0 ? 0 : from.size() / at(t.lanes);
    std::vector<double> out;
    out.reserve(rows * lanes.size());
    for (std::size_t row = 0; row < rows; ++row)
        for (int lane : lanes) out.push_back(from[row * at(t.lanes) + at(lane)]);
    return out;
}

}  // namespace

std::vector<LocalTable> local_tables(const std::vector<Element>& elements, bool fine) {
    std::vector<LocalTable> tables;
    for (const ElementRole role : {ElementRole::metal, ElementRole::panel, ElementRole::layer})
        for (const CellKind kind : {CellKind::quadrilateral, CellKind::triangle, CellKind::segment}) {
            LocalTable t;
            t.role = role;
            t.kind = kind;
            for (std::size_t e = 0; e < elements.size(); ++e)
                if (elements[e].role == role && elements[e].kind == kind) t.element.push_back(static_cast<int>(e));
            if (t.element.empty()) continue;
            t.points = points_per_cell(kind, fine);
            t.slots = elements[at(t.element.front())].slots();
            allocate(t);
            for (int lane = 0; lane < t.lanes; ++lane) {
                const Element& element = elements[at(t.element[at(lane)])];
                if (kind == CellKind::segment)
                    fill_segment(t, lane, element);
                else
                    fill_surface(t, lane, planar_element(element), element.thickness_m, fine);
            }
            set_active(t);
            tables.push_back(std::move(t));
        }
    return tables;
}

LocalTable mirror_image(const LocalTable& table, double plane_m) {
    LocalTable image = table;
    image.sign = -table.sign;
    for (int lane = 0; lane < table.lanes; ++lane)
        for (int j = 0; j < table.points; ++j) {
            double& z = image.position_at(j, 2, lane);
            z = 2 * plane_m - z;
            for (int slot = 0; slot < table.slots; ++slot) image.field_at(slot, j, 2, lane) *= -1;
        }
    return image;
}

LocalTable gather(const LocalTable& table, const std::vector<int>& lanes) {
    LocalTable out;
    out.role = table.role;
    out.kind = table.kind;
    out.points = table.points;
    out.slots = table.slots;
    out.sign = table.sign;
    out.active = table.active;
    for (int lane : lanes) out.element.push_back(table.element[at(lane)]);
    out.position = pick(table, table.position, lanes);
    out.field = pick(table, table.field, lanes);
    out.charge = pick(table, table.charge, lanes);
    out.radius2 = pick(table, table.radius2, lanes);
    out.lanes = static_cast<int>(lanes.size());
    return out;
}

}  // namespace annulet
