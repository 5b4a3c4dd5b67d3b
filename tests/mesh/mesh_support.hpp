// Models drawn in a line, and what every mesh must be.
#pragma once

#include <gtest/gtest.h>
#include <annulet/core/constants.hpp>
#include <annulet/mesh/mesh.hpp>
#include <annulet/mesh/quality.hpp>

#include <algorithm>
#include <cmath>
#include <map>
#include <set>
#include <string>
#include <utility>

namespace annulet::test {

using constants::pi;
inline constexpr double mm = 1e-3;

inline Metal metal(const std::string& name, Shape shape, int line = 1) {
    Metal m;
    m.name = name;
    m.shape = std::move(shape);
    m.conductor.conductivity_s_per_m = 5.8e7;
    m.conductor.thickness_m = 35e-6;
    m.where = {line, 1};
    return m;
}

inline Metal cut(const std::string& name, Shape shape, int line = 2) {
    Metal m = metal(name, std::move(shape), line);
    m.cut = true;
    return m;
}

inline Port port(const std::string& name, Placement placement, int line = 3) {
    Port p;
    p.name = name;
    p.placement = placement;
    p.where = {line, 1};
    return p;
}

inline Lumped part(const std::string& name, Placement placement, int line = 4) {
    Lumped p;
    p.name = name;
    p.placement = placement;
    p.capacitance_f = 1e-12;
    p.where = {line, 1};
    return p;
}

inline Ring ring(double radius, double width) {
    return Ring{{0, 0}, radius, width};
}
inline Rectangle box(double x, double y, double size_x, double size_y, double turn = 0) {
    return Rectangle{{x, y}, {size_x, size_y}, turn};
}
inline Bridge bridge(Vec2 from, Vec2 to, double width) {
    return Bridge{lift(from, 0), lift(to, 0), width};
}
inline Across across(Vec2 from, Vec2 to, double gap) {
    return Across{lift(from, 0), lift(to, 0), gap};
}

inline StripPath path(Vec2 start, const std::vector<Vec2>& ends, double width, bool closed = false) {
    StripPath p;
    p.start = start;
    for (const Vec2& end : ends) p.pieces.push_back({false, end, {0, 0}, 0});
    p.width_start_m = p.width_end_m = width;
    p.closed = closed;
    return p;
}

/// The ring of the river gauge: 54.9 mm, 8 mm wide, 1.2 mm gap at +x with a narrow bridge.
inline Model gauge_ring(double bridge_width) {
    Model model;
    model.metals = {metal("band", ring(54.9 * mm, 8 * mm)), cut("feed gap", box(54.9 * mm, 0, 16 * mm, 1.2 * mm))};
    model.ports = {port("feed", bridge({54.9 * mm, -0.6 * mm}, {54.9 * mm, 0.6 * mm}, bridge_width))};
    return model;
}

inline Vec3 node(const Mesh& mesh, const Cell& cell, int i) {
    return mesh.nodes[static_cast<std::size_t>(cell.node[static_cast<std::size_t>(i % 4)])];
}

inline double total_area(const Mesh& mesh) {
    double sum = 0;
    for (const Cell& cell : mesh.cells) sum += cell_area_m2(mesh, cell);
    return sum;
}

inline double gap_area(const Mesh& mesh, const Gap& gap) {
    double sum = 0;
    for (const Gap::Member& member : gap.members)
        sum += cell_area_m2(mesh, mesh.cells[static_cast<std::size_t>(member.cell)]);
    return sum;
}

/// Cells counter-clockwise and convex, all nodes used and apart, edges of at most two cells that run along them in
/// opposite senses, gap cells perfect. Returns the number of edges with one cell: the boundary.
inline int expect_sound(const Mesh& mesh) {
    std::map<std::pair<int, int>, int> directed;
    std::set<int> used;
    for (const Cell& cell : mesh.cells) {
        EXPECT_EQ(cell.kind, CellKind::quadrilateral);
        for (int i = 0; i < 4; ++i) {
            const Vec3 at = node(mesh, cell, i);
            EXPECT_GT((node(mesh, cell, i + 1) - at).cross(node(mesh, cell, i + 3) - at).z(), 0.0);
            const auto k = static_cast<std::size_t>(i);
            const std::pair<int, int> edge{cell.node[k], cell.node[(k + 1) % 4]};
            EXPECT_EQ(++directed[edge], 1) << "two cells on one side of an edge";
            used.insert(cell.node[k]);
        }
    }
    EXPECT_EQ(used.size(), mesh.nodes.size());
    std::vector<Vec3> sorted = mesh.nodes;
    std::sort(sorted.begin(), sorted.end(), [](const Vec3& a, const Vec3& b) { return a.x() < b.x(); });
    for (std::size_t i = 0; i < sorted.size(); ++i)
        for (std::size_t j = i + 1; j < sorted.size() && sorted[j].x() - sorted[i].x() < 1e-8; ++j)
            EXPECT_GT((sorted[j] - sorted[i]).norm(), 1e-8) << "two nodes in one place";
    std::set<int> gap_cells;
    for (const auto* gaps : {&mesh.ports, &mesh.lumped})
        for (const Gap& gap : *gaps)
            for (const Gap::Member& member : gap.members) {
                EXPECT_TRUE(gap_cells.insert(member.cell).second);
                EXPECT_NEAR(member.field_per_m.norm() * gap.length_m, 1.0, 1e-12);
            }
    for (std::size_t k = 0; k < mesh.cells.size(); ++k)
        EXPECT_EQ(mesh.cells[k].conductor == -1, gap_cells.contains(static_cast<int>(k)));
    int boundary = 0;
    for (const auto& [edge, count] : directed) boundary += directed.contains({edge.second, edge.first}) ? 0 : 1;
    return boundary;
}

/// Each node has a mirror image in the node set, within `within_m`.
template <class Mirror>
void expect_mirrored(const Mesh& mesh, const Mirror& mirror, double within_m) {
    for (const Vec3& p : mesh.nodes) {
        const Vec3 image = mirror(p);
        double nearest = 1;
        for (const Vec3& q : mesh.nodes) nearest = std::min(nearest, (q - image).norm());
        EXPECT_LT(nearest, within_m) << p.transpose();
    }
}

inline std::string fault_text(const Model& model, const MeshOptions& options = {}) {
    try {
        make_mesh(model, options);
    } catch (const InputError& error) {
        std::string text;
        for (const Diagnostic& fault : error.faults())
            text += std::to_string(fault.where.line) + ": " + fault.message + "\n";
        return text;
    }
    return "no fault";
}

}  // namespace annulet::test
