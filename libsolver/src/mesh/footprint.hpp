// Metal cells in plan, found again by their corners.
#pragma once

#include <annulet/geometry/region.hpp>
#include <annulet/mesh/mesh.hpp>

#include <array>
#include <map>
#include <utility>
#include <vector>

namespace annulet {

/// The surface cells on one plane.
class Footprint {
public:
    Footprint(const Mesh& mesh, double plane_m);
    const std::vector<int>& cells() const { return cells_; }
    /// Corners of a cell, counter-clockwise.
    Loop corners(int cell) const;
    /// The mesh node within a hundredth of a micrometre of `p`, or -1.
    int node_at(const Vec2& p) const;
    /// The cell with exactly these corners (mesh nodes, any order; -1 fills up triangles), or -1.
    int cell_with(std::array<int, 4> nodes) const;
    Vec2 point(int node) const { return mesh_.nodes[static_cast<std::size_t>(node)].head<2>(); }

private:
    static std::pair<long long, long long> key(const Vec2& p);
    const Mesh& mesh_;
    std::vector<int> cells_;
    std::map<std::pair<long long, long long>, int> nodes_;
    std::map<std::array<int, 4>, int> by_nodes_;
};

}  // namespace annulet
