#include <annulet/mom/current_samples.hpp>

#include "mom/pair_fill.hpp"

namespace annulet {

namespace {

void append(const LocalTable& table, const Basis& basis, const Eigen::VectorXcd& slot_current, CurrentSamples& out,
            Eigen::Index& next) {
    for (int lane = 0; lane < table.lanes; ++lane) {
        const int cell = table.cell[static_cast<std::size_t>(lane)];
        const int first = basis.first_slot[static_cast<std::size_t>(cell)];
        for (int j = 0; j < table.points; ++j, ++next) {
            std::complex<double> outflow = 0;
            for (int axis = 0; axis < 3; ++axis) {
                out.position_m(axis, next) = table.position_at(j, axis, lane);
                std::complex<double> sum = 0;
                for (int slot = 0; slot < table.slots; ++slot)
                    sum += table.field_at(slot, j, axis, lane) * slot_current[first + slot];
                out.moment_a_m(axis, next) = table.sign * sum;
            }
            for (int slot = 0; slot < table.slots; ++slot) outflow += slot_current[first + slot];
            out.charge_c_per_s[next] = table.sign * table.charge_at(j, lane) * outflow;
            out.cell.push_back(cell);
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
    CurrentSamples out{Eigen::Matrix3Xd(3, points), Eigen::Matrix3Xcd(3, points), Eigen::VectorXcd(points), {}};
    const Eigen::VectorXcd slot_current = op.basis().slots * coefficients;
    Eigen::Index next = 0;
    for (std::size_t s = 0; s < sets; ++s)
        for (const LocalTable& t : sources[s].fine) append(t, op.basis(), slot_current, out, next);
    return out;
}

}  // namespace annulet
