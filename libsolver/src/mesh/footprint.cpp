#include "mesh/footprint.hpp"

#include <algorithm>
#include <cmath>

namespace annulet {

namespace {
constexpr double same_plane_m = 1e-9;
constexpr double same_place_m = 1e-8;
}  // namespace

Footprint::Footprint(const Mesh& mesh, double plane_m) : mesh_(mesh) {
    for (std::size_t k = 0; k < mesh.cells.size(); ++k) {
        const Cell& cell = mesh.cells[k];
        if (cell.kind == CellKind::segment) continue;
        bool on_plane = true;
        for (int i = 0; i < cell.corners(); ++i) {
            const Vec3& p = mesh.nodes[static_cast<std::size_t>(cell.node[static_cast<std::size_t>(i)])];
            on_plane = on_plane && std::abs(p.z() - plane_m) <= same_plane_m;
        }
        if (!on_plane) continue;
        cells_.push_back(static_cast<int>(k));
        std::array<int, 4> nodes = cell.node;
        for (int i = 0; i < cell.corners(); ++i) {
            const int node = nodes[static_cast<std::size_t>(i)];
            nodes_.emplace(key(point(node)), node);
        }
        std::sort(nodes.begin(), nodes.end());
        by_nodes_.emplace(nodes, static_cast<int>(k));
    }
}

Loop Footprint::corners(int index) const {
    const Cell& cell = mesh_.cells[static_cast<std::size_t>(index)];
    Loop loop;
    for (int i = 0; i < cell.corners(); ++i) loop.push_back(point(cell.node[static_cast<std::size_t>(i)]));
    if (signed_area(loop) < 0) std::reverse(loop.begin(), loop.end());
    return loop;
}

std::pair<long long, long long> Footprint::key(const Vec2& p) {
    return {std::llround(p.x() / same_place_m), std::llround(p.y() / same_place_m)};
}

int Footprint::node_at(const Vec2& p) const {
    const auto [x, y] = key(p);
    for (long long i = x - 1; i <= x + 1; ++i)
        for (long long j = y - 1; j <= y + 1; ++j)
            if (const auto found = nodes_.find({i, j});
                found != nodes_.end() && (point(found->second) - p).norm() <= same_place_m)
                return found->second;
    return -1;
}

int Footprint::cell_with(std::array<int, 4> nodes) const {
    std::sort(nodes.begin(), nodes.end());
    const auto found = by_nodes_.find(nodes);
    return found == by_nodes_.end() ? -1 : found->second;
}

}  // namespace annulet
