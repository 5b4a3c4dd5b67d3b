// Cells along each piece and each gap: by wavelength, by curvature, graded toward ends and gaps.
#pragma once

#include <annulet/mesh/mesh.hpp>

#include <vector>

#include "mesh/gaps.hpp"
#include "mesh/spacing.hpp"

namespace annulet {

/// Cells of one block at refine = 1 and the size field they follow; without a field they are equal.
struct AlongBlock {
    double cells = 1;
    double length_m = 0;
    double h_from_m = 0;
    double h_to_m = 0;
    double h_max_m = 0;
    bool equal = false;

    /// Node positions as fractions of the length, 0 and 1 included.
    std::vector<double> fractions(double refine) const;
};

struct AlongGrid {
    std::vector<std::vector<AlongBlock>> blocks;  ///< per piece, per block
    std::vector<double> span_cells;               ///< per span, at refine = 1
};

AlongGrid along_grid(const Layout& layout, const MeshOptions& options);

}  // namespace annulet
