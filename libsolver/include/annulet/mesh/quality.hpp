// Figures that tell whether a mesh is fit for use.
#pragma once

#include <annulet/mesh/mesh.hpp>

namespace annulet {

struct MeshQuality {
    int quadrilaterals = 0;
    int triangles = 0;
    int segments = 0;
    int gap_cells = 0;       ///< of ports and parts, counted above as well
    int interior_edges = 0;  ///< edges and ends between two cells: the unknowns of a mesh without branches
    double smallest_edge_m = 0;
    double largest_edge_m = 0;
    double smallest_angle_rad = 0;  ///< at a corner of a surface cell
    double largest_angle_rad = 0;
    double largest_over_wavelength = 0;  ///< longest edge at the frequency asked about
};

/// All figures are zero for an empty mesh.
MeshQuality mesh_quality(const Mesh& mesh, double frequency_hz);

/// Memory for a dense complex matrix of that order, its factors and work space.
double matrix_bytes(double unknowns);

/// Area of a surface cell (m^2), 0 for a segment.
double cell_area_m2(const Mesh& mesh, const Cell& cell);

}  // namespace annulet
