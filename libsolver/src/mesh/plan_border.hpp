// The outline of a set of cells in plan.
#pragma once

#include <annulet/geometry/region.hpp>
#include <annulet/mesh/mesh.hpp>

#include <span>
#include <vector>

namespace annulet {

/// Loops along the edges that one cell has alone, cells on the left; corners are cell corners. Cells are
/// counter-clockwise and share whole edges.
std::vector<Loop> border_loops(std::span<const SheetMesh::Column> cells, std::span<const Vec2> points);

}  // namespace annulet
