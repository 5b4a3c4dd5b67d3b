#include "support/ring_mode.hpp"

#include <annulet/core/constants.hpp>
#include <annulet/numerics/roots.hpp>
#include <annulet/sweep/sweep.hpp>

#include <Eigen/Cholesky>

#include <cmath>

namespace annulet::test {

namespace {

/// Unknowns that flow around: joined through the edges 3 -> 0 of the cells, i.e. between rows of constant phi.
/// Row-major cells: cell = column * rows + row. Returns +-1 for current in the direction of growing phi, else 0.
struct Flow {
    int row = -1;
    double sign = 0;
    double phi = 0;
};

std::vector<Flow> around(const Mesh& mesh, const Basis& basis, int rows) {
    std::vector<Flow> out(static_cast<std::size_t>(basis.unknowns));
    for (std::size_t c = 0; c < mesh.cells.size(); ++c) {
        // Slot 2 is the edge node[2] -> node[3], the end of the cell at larger phi.
        const int slot = basis.first_slot[c] + 2;
        for (Eigen::SparseMatrix<double, Eigen::RowMajor>::InnerIterator i(basis.slots, slot); i; ++i) {
            const Vec3 p = mesh.nodes[static_cast<std::size_t>(mesh.cells[c].node[2])];
            out[static_cast<std::size_t>(i.col())] = {static_cast<int>(c) % rows, i.value(), std::atan2(p.y(), p.x())};
        }
    }
    return out;
}

}  // namespace

Eigen::VectorXd cosine_current(const Mesh& mesh, const Basis& basis, const std::vector<double>& across) {
    const int rows = static_cast<int>(across.size()) - 1;
    Eigen::VectorXd c = Eigen::VectorXd::Zero(basis.unknowns);
    const auto flow = around(mesh, basis, rows);
    for (std::size_t n = 0; n < flow.size(); ++n) {
        if (flow[n].row < 0) continue;
        const auto j = static_cast<std::size_t>(flow[n].row);
        const double share = (std::asin(2 * across[j + 1] - 1) - std::asin(2 * across[j] - 1)) / constants::pi;
        c[static_cast<Eigen::Index>(n)] = flow[n].sign * share * std::cos(flow[n].phi);
    }
    return c;
}

double mode_frequency_hz(const Operator& op, const Eigen::VectorXd& current, double from_hz, double to_hz) {
    const auto reactance = [&](double f) {
        const Eigen::VectorXcd zc = op.impedance_matrix(f) * current;
        return (current.transpose() * zc).value().imag();
    };
    return bracketed_root(reactance, from_hz, to_hz, 1e-9);
}

double driven_mode_frequency_hz(Mesh annulus, double from_hz, double to_hz) {
    Gap drive;
    for (std::size_t c = 0; c < annulus.cells.size(); ++c) {
        Vec3 centre = Vec3::Zero();
        for (int n : annulus.cells[c].node) centre += annulus.nodes[static_cast<std::size_t>(n)] / 4;
        const double r2 = centre.squaredNorm();
        drive.members.push_back(
            {static_cast<int>(c), Vec3(-centre.y(), centre.x(), 0) * (centre.x() / (r2 * std::sqrt(r2)))});
    }
    annulus.ports = {drive};
    const Operator op(std::move(annulus));
    const auto susceptance = [&](double f) { return solve_point(op, f, false).admittance_s(0, 0).imag(); };
    return bracketed_root(susceptance, from_hz, to_hz, 1e-9);
}

double ring_inductance_h(const Operator& op, int rows) {
    const auto flow = around(op.mesh(), op.basis(), rows);
    Eigen::MatrixXd loops = Eigen::MatrixXd::Zero(op.unknowns(), rows);
    for (std::size_t n = 0; n < flow.size(); ++n)
        if (flow[n].row >= 0) loops(static_cast<Eigen::Index>(n), flow[n].row) = flow[n].sign;
    const Eigen::MatrixXd l = constants::mu0_h_per_m * loops.transpose() * op.static_vector_potential() * loops;
    return 1 / l.ldlt().solve(Eigen::VectorXd::Ones(rows)).sum();
}

double capacitance_f(const Operator& op) {
    const Eigen::MatrixXd p = op.static_scalar_potential();
    return constants::eps0_f_per_m * p.ldlt().solve(Eigen::VectorXd::Ones(p.rows())).sum();
}

}  // namespace annulet::test
