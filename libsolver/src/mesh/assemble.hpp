// From node lines to nodes and cells.
#pragma once

#include <annulet/mesh/mesh.hpp>
#include <annulet/mesh/quality.hpp>

#include <vector>

#include "mesh/along_grid.hpp"
#include "mesh/cross_grid.hpp"

namespace annulet {

/// Edges between two cells, known before any cell is made.
double count_unknowns(const Layout& layout, const std::vector<CrossGrid>& across, const AlongGrid& along,
                      double refine);

/// `across` refined. Throws InputError where a cell would not be convex.
Mesh assemble(const Model& model, const Layout& layout, const std::vector<CrossGrid>& across, const AlongGrid& along,
              double refine);

}  // namespace annulet
