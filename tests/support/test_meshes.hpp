// Meshes made by hand, so that tests of the fields do not depend on the mesher.
#pragma once

#include <annulet/mesh/mesh.hpp>

#include <vector>

namespace annulet::test {

/// n cells on [0, 1]: equal, or with cosine spacing (both ends fine).
std::vector<double> uniform_nodes(int n);
std::vector<double> cosine_nodes(int n);
/// Three cells whose outer two have the width `edge`.
std::vector<double> edge_nodes(double edge);

/// Full annulus in z = `z_m` with radii from the nodes across (mapped to [r_in, r_out]); circles of nodes moved
/// outward so that the polygons keep the area of the circles.
Mesh annulus(double r_in_m, double r_out_m, int around, const std::vector<double>& across, double z_m = 0);

/// A ring with a port of `gap_m` (arc length on the mean radius) centred at phi = 0, `gap_cells` cells in it; the
/// rest in `around` cells.
Mesh ring_with_port(double mean_radius_m, double width_m, double gap_m, int gap_cells, int around,
                    const std::vector<double>& across);

/// Rectangle [0, a] x [0, b] with the given nodes in either direction (mapped from [0, 1]).
Mesh plate(double a_m, double b_m, const std::vector<double>& along, const std::vector<double>& across);

/// Disc of quadrilateral cells: a square core mapped smoothly to the circle, `n` cells in each direction.
Mesh disc(double radius_m, int n);

}  // namespace annulet::test
