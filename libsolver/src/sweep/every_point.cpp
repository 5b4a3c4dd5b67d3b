#include <fmt/format.h>
#include <annulet/core/diagnostics.hpp>
#include <annulet/numerics/symmetric_solver.hpp>
#include <annulet/sweep/sweep.hpp>

#include <algorithm>
#include <chrono>
#include <utility>

namespace annulet {

using Clock = std::chrono::steady_clock;

SolveQuality quality_of(const SymmetricSolver& solver, const Eigen::MatrixXcd& currents, const Eigen::MatrixXcd& v) {
    const Eigen::MatrixXcd y = v.transpose() * currents;
    const double scale = y.size() > 0 ? y.cwiseAbs().maxCoeff() : 0;
    return {solver.relative_residual(currents, v), solver.reciprocal_condition(),
            scale > 0 ? (y - y.transpose()).cwiseAbs().maxCoeff() / scale : 0};
}

SolveQuality worse(const SolveQuality& a, const SolveQuality& b) {
    return {std::max(a.relative_residual, b.relative_residual),
            std::min(a.reciprocal_condition, b.reciprocal_condition), std::max(a.asymmetry, b.asymmetry)};
}

SweepPoint solve_point(const Operator& op, double frequency_hz, bool keep_currents) {
    const auto start = Clock::now();
    Eigen::MatrixXcd matrix = op.impedance_matrix(frequency_hz);
    const auto filled = Clock::now();
    const SymmetricSolver solver(std::move(matrix));
    if (!solver.ok())
        throw NumericalError(fmt::format("no solution at {:.6g} Hz: {}", frequency_hz, solver.status().message));
    const Eigen::MatrixXcd v = op.port_vectors().cast<std::complex<double>>();
    SweepPoint point;
    point.frequency_hz = frequency_hz;
    Eigen::MatrixXcd currents = solver.solve(v);
    point.admittance_s = v.transpose() * currents;
    point.quality = quality_of(solver, currents, v);
    point.fill_s = std::chrono::duration<double>(filled - start).count();
    point.factor_s = std::chrono::duration<double>(Clock::now() - filled).count();
    if (keep_currents) point.currents_a = std::move(currents);
    return point;
}

std::vector<SweepPoint> sweep_every_point(const Operator& op, const std::vector<double>& frequency_hz,
                                          const SweepOptions& options, Progress* progress) {
    // Fill and factorisation both use all threads by themselves, so frequencies go one after the other.
    std::vector<SweepPoint> points;
    points.reserve(frequency_hz.size());
    for (std::size_t i = 0; i < frequency_hz.size(); ++i) {
        checkpoint(progress, "solve", i, frequency_hz.size());
        points.push_back(solve_point(op, frequency_hz[i], options.keep_currents));
    }
    checkpoint(progress, "solve", frequency_hz.size(), frequency_hz.size());
    return points;
}

}  // namespace annulet
