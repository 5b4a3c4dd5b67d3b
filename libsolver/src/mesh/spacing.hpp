// Where node lines go: across a strip by edge grading, along it by a size field.
#pragma once

#include <annulet/mesh/mesh.hpp>

namespace annulet {

/// Smooth map of the width, tau in [-1, 1], to u in [0, 1]: equal steps of u are cells of the wanted grading.
/// With tau = -cos(theta), theta is linear in u (cosine spacing) or linear in three parts so that u = 1/3 and
/// 2/3 cut off edge cells of the wanted fraction; the current goes as 1/sqrt(1 - tau^2), so equal steps in theta
/// carry equal current. Uniform: u = (tau + 1)/2.
class AcrossMap {
public:
    explicit AcrossMap(double edge_cell_fraction);
    double to_u(double tau) const;
    double to_tau(double u) const;

private:
    bool uniform_ = false;
    double edge_theta_ = 0;  ///< theta at u = 1/3
};

/// Cell sizes along a stretch of length L: h(d) = min(h_max, h_from + growth d, h_to + growth (L - d)).
class SizeField {
public:
    SizeField(double length_m, double h_from_m, double h_to_m, double h_max_m, double growth_per_m_m = growth);
    /// Integral of dd/h: the number of cells, not yet rounded.
    double cells() const { return total_; }
    /// Distance d from the start at which `count` cells are used up.
    double position_m(double count) const;
    /// Growth of the cell size per length: neighbouring cells differ by a factor of at most e^growth = 1.8.
    static constexpr double growth = 0.6;

private:
    double length_m_, h_from_m_, h_to_m_, h_max_m_, growth_;
    double ramp_from_m_, ramp_to_m_;  ///< lengths over which the size grows
    double cells_from_, cells_mid_, total_;
};

/// Whole number of cells for a count at refine = 1, and the same refined.
double whole_cells(double cells);
double refined_cells(double whole, double refine);

}  // namespace annulet
