#include "mesh/plan_border.hpp"

#include <cmath>
#include <map>
#include <set>

namespace annulet {

namespace {

double turn(const Vec2& in, const Vec2& out) {
    return std::atan2(cross(in, out), in.dot(out));
}

}  // namespace

std::vector<Loop> border_loops(std::span<const SheetMesh::Column> cells, std::span<const Vec2> points) {
    std::set<std::pair<int, int>> edges;
    for (const SheetMesh::Column& cell : cells) {
        const std::size_t n = cell.kind == CellKind::quadrilateral ? 4 : 3;
        for (std::size_t i = 0; i < n; ++i) {
            const int a = cell.node[i], b = cell.node[(i + 1) % n];
            if (edges.erase({b, a}) == 0) edges.insert({a, b});
        }
    }
    const auto at = [&](int node) { return points[static_cast<std::size_t>(node)]; };
    std::vector<Loop> loops;
    while (!edges.empty()) {
        const auto first = *edges.begin();
        edges.erase(edges.begin());
        Loop loop{at(first.first)};
        for (auto edge = first; edge.second != first.first;) {
            loop.push_back(at(edge.second));
            // Where cells meet in a corner only, stay with the own ones: turn left as far as possible.
            auto best = edges.end();
            double most = -10;
            for (auto next = edges.lower_bound({edge.second, -1}); next != edges.end() && next->first == edge.second;
                 ++next) {
                const double angle = turn(at(edge.second) - at(edge.first), at(next->second) - at(edge.second));
                if (angle > most) most = angle, best = next;
            }
            if (best == edges.end()) break;
            edge = *best;
            edges.erase(best);
        }
        loops.push_back(std::move(loop));
    }
    return loops;
}

}  // namespace annulet
