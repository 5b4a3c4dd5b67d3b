// Geometry of the local functions: a planar cell is a fan of triangles about one apex, on each of which every
// local function is affine, f = c + d r, with the same d on all triangles (constant charge density).
#pragma once

#include <array>
#include <vector>

#include "mom/elements.hpp"

namespace annulet {

/// Triangle k of the fan has the corners edge_start[k], edge_end[k], apex.
struct PlanarElement {
    int slots = 0;  ///< 3 or 4
    std::array<Vec3, 4> corner;
    Vec3 apex{0, 0, 0};  ///< crossing of the diagonals, or the centroid of a triangle
    Vec3 normal{0, 0, 1};
    double area_m2 = 0;
    std::array<std::array<Vec3, 4>, 4> constant;  ///< [triangle of the fan][slot]: c (1/m)
    double slope_per_m2 = 0;                      ///< d = 1 / (2 area)

    const Vec3& edge_start(int k) const { return corner[static_cast<std::size_t>(k)]; }
    const Vec3& edge_end(int k) const { return corner[static_cast<std::size_t>((k + 1) % slots)]; }
    double triangle_area(int k) const;
    /// Value of a local function in triangle k of the fan, 1/m.
    Vec3 value(int k, int slot, const Vec3& r) const {
        return constant[static_cast<std::size_t>(k)][static_cast<std::size_t>(slot)] + slope_per_m2 * r;
    }
    double diameter() const;
    PlanarElement mirrored(double plane_z_m) const;  ///< mirror image, local functions mirrored with it
};

/// On a quadrilateral the local functions are the mean of the two built from the triangles of either diagonal,
/// each with the diagonal eliminated so that both triangles carry the same charge density: div-conforming,
/// reproduces constants and keeps mirror symmetries of the mesh.
PlanarElement planar_element(const Element& element);
PlanarElement planar_element(const Mesh& mesh, const Cell& cell);

/// Affine field over the whole cell with the same zeroth and first moments as the local function; equal to it on
/// triangles, to the bilinear rooftop on parallelograms. f = mean + gradient (r - centroid).
struct MomentField {
    Vec3 centroid{0, 0, 0};
    std::array<Vec3, 4> mean;
    std::array<Eigen::Matrix3d, 4> gradient;
};
MomentField moment_field(const PlanarElement& element);

}  // namespace annulet
