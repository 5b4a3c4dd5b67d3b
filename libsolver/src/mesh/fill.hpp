// A planar region of any shape filled with cells: layers of quadrilaterals along its edges, triangles within.
#pragma once

#include <annulet/geometry/boolean.hpp>
#include <annulet/mesh/mesh.hpp>

#include <vector>

namespace annulet {

struct FillRequest {
    Loops2 loops;  ///< outer one counter-clockwise, then the holes; corners are kept as they are
    std::vector<std::vector<double>> first_layer_m;  ///< per corner: smallest wanted size across the edge; 0: no layer
    double growth = 1;                               ///< of cell size with distance from the edge
    double h_max_m = 0;                              ///< largest cell
    int most_layers = 5;
    double refine = 1;  ///< the loops are already refined
};

struct FilledRegion {
    std::vector<Vec2> points;  ///< those of the loops in their order, then others
    std::vector<SheetMesh::Column> cells;
};

FilledRegion fill(const FillRequest& request);

}  // namespace annulet
