#include <algorithm>
#include <annulet/core/constants.hpp>
#include <annulet/mesh/quality.hpp>
#include <cmath>
#include <limits>
#include <map>
#include <utility>

namespace annulet {

namespace {

Vec3 corner(const Mesh& mesh, const Cell& cell, int i) {
    const int n = cell.corners();
    return mesh.nodes[static_cast<std::size_t>(cell.node[static_cast<std::size_t>((i + n) % n)])];
}

void count(const Cell& cell, MeshQuality& quality) {
    switch (cell.kind) {
        case CellKind::quadrilateral:
            ++quality.quadrilaterals;
            break;
        case CellKind::triangle:
            ++quality.triangles;
            break;
        case CellKind::segment:
            ++quality.segments;
            break;
    }
}

void measure(const Mesh& mesh, const Cell& cell, MeshQuality& quality) {
    const int edges = cell.kind == CellKind::segment ? 1 : cell.corners();
    for (int i = 0; i < edges; ++i) {
        const Vec3 out = corner(mesh, cell, i + 1) - corner(mesh, cell, i);
        quality.smallest_edge_m = std::min(quality.smallest_edge_m, out.norm());
        quality.largest_edge_m = std::max(quality.largest_edge_m, out.norm());
        if (edges == 1) continue;
        const Vec3 in = corner(mesh, cell, i - 1) - corner(mesh, cell, i);
        const double angle = std::atan2(out.cross(in).norm(), out.dot(in));
        quality.smallest_angle_rad = std::min(quality.smallest_angle_rad, angle);
        quality.largest_angle_rad = std::max(quality.largest_angle_rad, angle);
    }
}

int interior_edges(const Mesh& mesh) {
    std::map<std::pair<int, int>, int> cells_at;  // an end of a segment as (-1, node)
    for (const Cell& cell : mesh.cells) {
        const auto n = static_cast<std::size_t>(cell.corners());
        for (std::size_t i = 0; i < n; ++i) {
            const int other = cell.kind == CellKind::segment ? -1 : cell.node[(i + 1) % n];
            const std::pair<int, int> key = std::minmax(cell.node[i], other);
            ++cells_at[key];
        }
    }
    return static_cast<int>(
        std::count_if(cells_at.begin(), cells_at.end(), [](const auto& entry) { return entry.second > 1; }));
}

}  // namespace

MeshQuality mesh_quality(const Mesh& mesh, double frequency_hz) {
    MeshQuality quality;
    if (mesh.cells.empty()) return quality;
    quality.smallest_edge_m = quality.smallest_angle_rad = std::numeric_limits<double>::infinity();
    for (const Cell& cell : mesh.cells) {
        count(cell, quality);
        measure(mesh, cell, quality);
    }
    if (std::isinf(quality.smallest_angle_rad)) quality.smallest_angle_rad = 0;
    for (const auto* gaps : {&mesh.ports, &mesh.lumped})
        for (const Gap& gap : *gaps) quality.gap_cells += static_cast<int>(gap.members.size());
    quality.interior_edges = interior_edges(mesh);
    quality.largest_over_wavelength = quality.largest_edge_m * frequency_hz / constants::c0_m_per_s;
    return quality;
}

double cell_area_m2(const Mesh& mesh, const Cell& cell) {
    if (cell.kind == CellKind::segment) return 0;
    Vec3 twice(0, 0, 0);
    for (int i = 1; i + 1 < cell.corners(); ++i)
        twice +=
            (corner(mesh, cell, i) - corner(mesh, cell, 0)).cross(corner(mesh, cell, i + 1) - corner(mesh, cell, 0));
    return 0.5 * twice.norm();
}

}  // namespace annulet
