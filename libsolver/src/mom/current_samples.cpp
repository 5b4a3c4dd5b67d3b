#include <annulet/mom/current_samples.hpp>

#include <cmath>

#include "mom/pair_fill.hpp"

namespace annulet {

namespace {

struct Coefficients {
    Eigen::VectorXcd slot;     ///< current of every local function, A
    Eigen::VectorXcd outflow;  ///< net outward current of every element that carries charge, A
};

void append(const LocalTable& table, const Basis& basis, const Coefficients& c, CurrentSamples& out,
            Eigen::Index& next) {
    for (int lane = 0; lane < table.lanes; ++lane) {
        const int element = table.element[static_cast<std::size_t>(lane)];
        const int first = basis.first_slot[static_cast<std::size_t>(element)];
        const std::complex<double> outflow = table.carries_charge() ? c.outflow[element] : 0;
        for (int j = 0; j < table.points; ++j, ++next) {
            for (int axis = 0; axis < 3; ++axis) {
                out.position_m(axis, next) = table.position_at(j, axis, lane);
                std::complex<double> sum = 0;
                for (int slot = 0; slot < table.slots; ++slot)
                    sum += table.field_at(slot, j, axis, lane) * c.slot[first + slot];
                out.moment_a_m(axis, next) = table.sign * sum;
            }
            out.charge_c_per_s[next] = table.sign * table.charge_at(j, lane) * outflow;
            out.radius_m[next] = std::sqrt(table.radius2[static_cast<std::size_t>(lane)]);
            out.element.push_back(element);
        }
    }
}

}  // namespace

CurrentSamples sample_currents(const Operator& op, const Eigen::VectorXcd& coefficients, bool with_images) {
    const auto& sources = op.pair_tables().sources;
    const std::size_t sets = with_images ? sources.size() : 1;
    Eigen::Index points = 0;
    for (std::size_t s = 0; s < sets; ++s)
        for (const LocalTable& t : sources[s].fine) points += t.points * t.lanes;
    CurrentSamples out{Eigen::Matrix3Xd(3, points),
                       Eigen::Matrix3Xcd(3, points),
                       Eigen::VectorXcd(points),
                       Eigen::VectorXd(points),
                       {}};
    const Coefficients c{op.basis().slots * coefficients, op.basis().divergence * coefficients};
    Eigen::Index next = 0;
    for (std::size_t s = 0; s < sets; ++s)
        for (const LocalTable& t : sources[s].fine) append(t, op.basis(), c, out, next);
    return out;
}

}  // namespace annulet
