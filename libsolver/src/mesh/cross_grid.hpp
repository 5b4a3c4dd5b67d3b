// Node lines across each piece: the grading, and the edges of the bridges that land on it.
#pragma once

#include <annulet/mesh/mesh.hpp>

#include <vector>

#include "mesh/gaps.hpp"

namespace annulet {

struct CrossGrid {
    std::vector<double> lines;    ///< tau of lines that must be there, from -1 to 1
    std::vector<double> cells;    ///< cells between them at refine = 1
    std::vector<double> taus;     ///< all node lines, refined
    std::vector<int> line_index;  ///< of each of `lines` in `taus`
};

/// One grid per piece of `layout`. Lines run along the whole piece; ends that a bridge or a join connects carry the
/// same number of cells. Moves the landings onto the lines they were merged with.
/// `taus` are left to refine_grids, so that the size of the mesh is known before it is made.
std::vector<CrossGrid> cross_grids(Layout& layout, const MeshOptions& options);
void refine_grids(std::vector<CrossGrid>& grids, const MeshOptions& options);

/// Width of the cell at the edge of a strip of the given width at refine = 1.
double edge_cell_m(double width_m, const MeshOptions& options);

/// Indices of the node lines from tau_a to tau_b of a landing, in that order.
std::vector<int> landing_lines(const CrossGrid& grid, const Landing& landing);

}  // namespace annulet
