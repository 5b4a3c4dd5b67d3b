// Port parameters over frequency, with the currents and what vouches for them.
#pragma once

#include <annulet/core/progress.hpp>
#include <annulet/mom/operator.hpp>

#include <Eigen/Core>

#include <vector>

namespace annulet {

/// Figures that every solved frequency carries.
struct SolveQuality {
    double relative_residual = 0;     ///< largest over ports of |v - Z I| / (|Z| |I| + |v|)
    double reciprocal_condition = 0;  ///< LAPACK 1-norm estimate
    double asymmetry = 0;             ///< largest |Y_pq - Y_qp| over the largest |Y_pq|: reciprocity of the ports
};

struct SweepPoint {
    double frequency_hz = 0;
    Eigen::MatrixXcd admittance_s;  ///< ports x ports, siemens, at the gaps
    Eigen::MatrixXcd currents_a;    ///< unknowns x ports, amperes per volt on that port, others shorted
    SolveQuality quality;
    double fill_s = 0, factor_s = 0;  ///< wall-clock time of filling the matrix, of factorising and solving
};

struct SweepOptions {
    bool keep_currents = true;
    int threads = 0;  ///< 0: OpenMP default
};

/// What a solution of Z I = v (unknowns x ports) came to; Y = v^T I.
class SymmetricSolver;
SolveQuality quality_of(const SymmetricSolver& solver, const Eigen::MatrixXcd& currents, const Eigen::MatrixXcd& v);

/// The worse of both in every figure.
SolveQuality worse(const SolveQuality& a, const SolveQuality& b);

/// One frequency: exact fill, full factorisation. Throws NumericalError (singular).
SweepPoint solve_point(const Operator& op, double frequency_hz, bool keep_currents = true);

/// Exact fill and full factorisation at every frequency, frequencies in parallel where that is faster.
/// `frequency_hz` ascending and > 0. Throws NumericalError (singular), Cancelled.
std::vector<SweepPoint> sweep_every_point(const Operator& op, const std::vector<double>& frequency_hz,
                                          const SweepOptions& options, Progress* progress = nullptr);

}  // namespace annulet
