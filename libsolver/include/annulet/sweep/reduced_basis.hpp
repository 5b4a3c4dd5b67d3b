// All frequencies from a handful of solutions: the operator projected on currents solved exactly.
#pragma once

#include <annulet/core/progress.hpp>
#include <annulet/mom/affine.hpp>
#include <annulet/sweep/sweep.hpp>

#include <Eigen/Core>

#include <complex>
#include <functional>
#include <memory>
#include <span>
#include <vector>

namespace annulet {

/// A natural mode: the reduced matrix is singular at `s` = sigma + jw (1/s).
struct ReducedPole {
    std::complex<double> s;
    Eigen::VectorXcd vector;  ///< in the reduced basis, 2-norm 1
    double frequency_hz() const;
    double q() const;  ///< |w| / 2|sigma|
};

/// The matrix V^T Z(s) V with a real orthonormal V of solved currents (real, so that conjugate symmetry survives), and
/// Y = (V^T v)^T (V^T Z V)^-1 V^T v. For complex symmetric Z the error of Y is r^T Z^-1 r exactly, r = v - Z V y: of
/// second order in the residual.
class ReducedModel {
public:
    explicit ReducedModel(const AffineOperator& affine);

    /// Adds the parts of currents (unknowns x m) that the basis lacks, real and imaginary parts apart.
    void add(const AffineOperator& affine, const Eigen::MatrixXcd& currents);

    /// Orthonormal directions of currents (unknowns x m) outside the basis, down to `least_part` of the largest.
    Eigen::MatrixXd principal_directions(const Eigen::MatrixXcd& currents, double least_part) const;

    int size() const { return static_cast<int>(basis_.cols()); }
    const Eigen::MatrixXd& basis() const { return basis_; }  ///< V: unknowns x size

    Eigen::MatrixXcd matrix(const AffineOperator& affine, std::complex<double> s) const;
    Eigen::MatrixXcd derivative(const AffineOperator& affine, std::complex<double> s) const;
    /// Reduced port vectors V^T v: size x ports.
    const Eigen::MatrixXd& ports() const { return ports_; }
    /// Coefficients y of the currents for unit voltage at each port: size x ports. Throws NumericalError.
    Eigen::MatrixXcd solve(const AffineOperator& affine, std::complex<double> s) const;
    /// v - Z V y for coefficients y at each of the frequencies: unknowns x (frequencies times ports).
    Eigen::MatrixXcd residuals(const AffineOperator& affine, std::span<const std::complex<double>> s,
                               std::span<const Eigen::MatrixXcd> y) const;

    /// Poles between the frequencies of `shift_hz`, ascending, which also are where the search linearises. With a
    /// resistance of `termination_ohm` at each port, empty: ports shorted.
    std::vector<ReducedPole> poles(const AffineOperator& affine, std::span<const double> shift_hz,
                                   std::span<const double> termination_ohm = {}) const;

private:
    Eigen::MatrixXd new_columns(const Eigen::MatrixXcd& currents) const;
    void project(const AffineOperator& affine, const Eigen::MatrixXd& columns);
    Eigen::MatrixXcd weighted_sum(const Eigen::VectorXcd& factor) const;

    Eigen::MatrixXd basis_, ports_;
    std::vector<Eigen::MatrixXd> images_;     ///< T_q V and then exact terms times V: unknowns x size
    std::vector<Eigen::MatrixXd> projected_;  ///< V^T of these: size x size
    Eigen::MatrixXd packed_;                  ///< their lower triangles, one column per term
    Eigen::MatrixXd port_vectors_;
};

struct ReducedOptions {
    double tolerance = 1e-6;  ///< of the scattering parameters
    int most_solves = 80;     ///< NumericalError where these do not suffice
    double factor_memory_bytes = 2.5e8;
    std::vector<double> reference_ohm;  ///< per port; empty: 50 ohm each
    /// S of an admittance matrix (ports x ports) at a frequency, where it is not that of `reference_ohm` at the gaps.
    std::function<Eigen::MatrixXcd(double frequency_hz, const Eigen::MatrixXcd& admittance_s)> scattering;
};

/// Solved by a greedy choice: the frequency of the largest estimated error is solved next; the estimate is the error
/// identity with the factorisation of the nearest solved frequency for Z^-1, on an own grid to which the poles of the
/// reduced model are added. Stops after two consecutive passes, on grids in between each other, below the tolerance,
/// and once an exact fill at an unsolved frequency agrees.
class ReducedSweep {
public:
    /// `affine` must outlive this. Throws NumericalError, Cancelled.
    ReducedSweep(const AffineOperator& affine, double from_hz, double to_hz, ReducedOptions options = {},
                 Progress* progress = nullptr);

    const ReducedModel& model() const { return model_; }
    const AffineOperator& affine() const { return *affine_; }

    /// At any frequency inside the range: ports x ports, S, and unknowns x ports, A.
    Eigen::MatrixXcd admittance_s(double frequency_hz) const;
    Eigen::MatrixXcd currents_a(double frequency_hz) const;
    std::vector<SweepPoint> evaluate(std::span<const double> frequency_hz, bool keep_currents) const;

    /// Bound of the error of every scattering parameter over the range, or as estimated at one frequency.
    double reflection_error() const { return reflection_error_; }
    double reflection_error(double frequency_hz) const;

    /// Verification solutions included, ascending.
    const std::vector<double>& solved_hz() const { return solved_hz_; }
    int full_solves() const { return static_cast<int>(solved_hz_.size()); }
    /// Directions won without a factorisation of their own.
    int enrichments() const { return enrichments_; }
    /// Natural modes between the ends of the range, ascending in frequency.
    std::vector<ReducedPole> poles(std::span<const double> termination_ohm = {}) const;
    const SolveQuality& worst() const { return worst_; }
    double fill_s() const { return fill_s_; }
    double factor_s() const { return factor_s_; }

private:
    struct Factor;
    struct Estimate {
        double frequency_hz = 0;
        double error = 0;
    };
    static Estimate largest(const std::vector<Estimate>& found);
    void run(Progress* progress);
    void solve_at(double frequency_hz);
    void drop_factor();
    bool enrich(const std::vector<Estimate>& wrong);
    void improve(const std::vector<Estimate>& found);
    const Factor& nearest_factor(double frequency_hz) const;
    bool verify(const Estimate& worst);
    std::vector<double> grid(double shift) const;
    std::vector<double> pole_grid() const;
    std::vector<Estimate> estimate(const std::vector<double>& frequency_hz) const;
    std::vector<double> shifts() const;
    double difference(double frequency_hz, const Eigen::MatrixXcd& a, const Eigen::MatrixXcd& b) const;
    void note(const SweepPoint& solved);

    const AffineOperator* affine_;
    double from_hz_, to_hz_;
    ReducedOptions options_;
    ReducedModel model_;
    std::vector<std::shared_ptr<const Factor>> factors_;
    std::vector<double> solved_hz_;
    std::vector<Estimate> estimates_;  ///< of the last pass, ascending in frequency
    double reflection_error_ = 0, verified_error_ = 0;
    int enrichments_ = 0;
    SolveQuality worst_{0, 1};
    double fill_s_ = 0, factor_s_ = 0;
};

}  // namespace annulet
