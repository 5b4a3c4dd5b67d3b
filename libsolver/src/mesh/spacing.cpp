#include "mesh/spacing.hpp"

#include <algorithm>
#include <annulet/core/constants.hpp>
#include <cmath>

namespace annulet {

using constants::pi;

AcrossMap::AcrossMap(double edge_cell_fraction) : uniform_(edge_cell_fraction < 0) {
    edge_theta_ = edge_cell_fraction > 0 ? std::acos(1 - 2 * std::min(edge_cell_fraction, 1.0 / 3)) : pi / 3;
}

double AcrossMap::to_u(double tau) const {
    if (uniform_) return 0.5 * (tau + 1);
    if (tau > 0) return 1 - to_u(-tau);
    const double theta = std::acos(std::clamp(-tau, -1.0, 1.0));
    if (theta <= edge_theta_) return theta / edge_theta_ / 3;
    return (1 + (theta - edge_theta_) / (pi - 2 * edge_theta_)) / 3;
}

double AcrossMap::to_tau(double u) const {
    if (uniform_) return 2 * u - 1;
    if (u > 0.5) return -to_tau(1 - u);
    if (u == 0.5) return 0;
    const double theta = u <= 1.0 / 3 ? 3 * u * edge_theta_ : edge_theta_ + (3 * u - 1) * (pi - 2 * edge_theta_);
    return -std::cos(theta);
}

SizeField::SizeField(double length_m, double h_from_m, double h_to_m, double h_max_m, double growth_per_m_m)
    : length_m_(length_m),
      h_from_m_(std::min(h_from_m, h_max_m)),
      h_to_m_(std::min(h_to_m, h_max_m)),
      h_max_m_(h_max_m),
      growth_(growth_per_m_m) {
    ramp_from_m_ = std::min((h_max_m_ - h_from_m_) / growth_, length_m_);
    ramp_to_m_ = std::min((h_max_m_ - h_to_m_) / growth_, length_m_);
    if (ramp_from_m_ + ramp_to_m_ > length_m_) {
        const double meet = 0.5 * (length_m_ + (h_to_m_ - h_from_m_) / growth_);
        ramp_from_m_ = std::clamp(meet, 0.0, length_m_);
        ramp_to_m_ = length_m_ - ramp_from_m_;
    }
    cells_from_ = std::log1p(growth_ * ramp_from_m_ / h_from_m_) / growth_;
    cells_mid_ = (length_m_ - ramp_from_m_ - ramp_to_m_) / h_max_m_;
    total_ = cells_from_ + cells_mid_ + std::log1p(growth_ * ramp_to_m_ / h_to_m_) / growth_;
}

double SizeField::position_m(double count) const {
    if (count <= cells_from_) return h_from_m_ * std::expm1(growth_ * count) / growth_;
    if (count <= cells_from_ + cells_mid_) return ramp_from_m_ + (count - cells_from_) * h_max_m_;
    return length_m_ - h_to_m_ * std::expm1(growth_ * (total_ - count)) / growth_;
}

double whole_cells(double cells) {
    return std::max(1.0, std::ceil(cells - 0.1));
}

double refined_cells(double whole, double refine) {
    return std::max(1.0, std::round(whole * refine));
}

}  // namespace annulet
