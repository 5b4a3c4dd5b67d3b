// Symbols: Z(s) operator, v port vectors, y reduced solution, r = v - Z V y, E = r^T Z^-1 r its error in Y.
#include <annulet/core/constants.hpp>
#include <annulet/core/diagnostics.hpp>
#include <annulet/numerics/blas_threads.hpp>
#include <annulet/numerics/symmetric_solver.hpp>
#include <annulet/sweep/reduced_basis.hpp>

#include <fmt/format.h>

#include <Eigen/LU>

#include <algorithm>
#include <chrono>
#include <cmath>
#include <exception>
#include <utility>

namespace annulet {

using Complex = std::complex<double>;
using Eigen::Index;
using Eigen::MatrixXcd;
using Eigen::MatrixXd;

namespace {

constexpr int grid_points = 64;
constexpr std::size_t fewest_factors = 4;    ///< before corrections take the place of solutions
constexpr double dominant = 0.1;             ///< part of a correction worth a direction
constexpr double contraction = 0.1;          ///< of the error that a correction must bring
constexpr std::size_t most_corrections = 4;  ///< at a time
constexpr double same_frequency = 1e-10;
/// The nearest factorisation stands for that of the frequency itself, so an estimate is right in size only.
constexpr double estimate_margin = 3, verified_margin = 3;

Complex on_axis(double frequency_hz) {
    return {0, 2 * constants::pi * frequency_hz};
}

/// Starting threads costs more than they save on small matrices.
int suited_threads(int unknowns) {
    constexpr int large = 1500;
    return unknowns < large ? 1 : BlasThreads::current();
}

double seconds_since(std::chrono::steady_clock::time_point start) {
    return std::chrono::duration<double>(std::chrono::steady_clock::now() - start).count();
}

/// S = (I - G)(I + G)^-1, G = sqrt(R) Y sqrt(R) for real references [Kurokawa1965].
MatrixXcd scattering_of(const MatrixXcd& admittance, const std::vector<double>& reference_ohm) {
    Eigen::VectorXd root(admittance.rows());
    for (Index p = 0; p < root.size(); ++p) root[p] = std::sqrt(reference_ohm[static_cast<std::size_t>(p)]);
    const MatrixXcd g = root.asDiagonal() * admittance * root.asDiagonal();
    const MatrixXcd one = MatrixXcd::Identity(g.rows(), g.cols());
    return (one + g).partialPivLu().solve(one - g);
}

}  // namespace

struct ReducedSweep::Factor {
    double frequency_hz = 0;
    SymmetricSolver solver;
};

ReducedSweep::ReducedSweep(const AffineOperator& affine, double from_hz, double to_hz, ReducedOptions options,
                           Progress* progress)
    : affine_(&affine), from_hz_(from_hz), to_hz_(to_hz), options_(std::move(options)), model_(affine) {
    if (options_.reference_ohm.empty())
        options_.reference_ohm.assign(static_cast<std::size_t>(affine.op().ports()), 50.0);
    run(progress);
    factors_.clear();
}

double ReducedSweep::difference(double frequency_hz, const MatrixXcd& a, const MatrixXcd& b) const {
    const auto s = [&](const MatrixXcd& y) {
        return options_.scattering ? options_.scattering(frequency_hz, y) : scattering_of(y, options_.reference_ohm);
    };
    return (s(a) - s(b)).cwiseAbs().maxCoeff();
}

ReducedSweep::Estimate ReducedSweep::largest(const std::vector<Estimate>& found) {
    return *std::max_element(found.begin(), found.end(), [](auto& a, auto& b) { return a.error < b.error; });
}

void ReducedSweep::run(Progress* progress) {
    const BlasThreads threads(suited_threads(affine_->op().unknowns()));
    const auto step = [&](double error_left) {
        checkpoint(progress, fmt::format("solve (error {:.1e})", error_left), solved_hz_.size(), 0);
    };
    for (double f : {from_hz_, to_hz_, 0.5 * (from_hz_ + to_hz_)}) {
        step(1);
        solve_at(f);
    }
    const auto fine = [&](const Estimate& e) { return e.error * estimate_margin <= options_.tolerance; };
    for (int passes = 0; passes < 2;) {
        auto found = estimate(grid(passes == 0 ? 0 : 0.5));
        // Poles are worth looking for only once nothing shows on the grid.
        if (std::all_of(found.begin(), found.end(), fine)) {
            const auto at_poles = estimate(pole_grid());
            found.insert(found.end(), at_poles.begin(), at_poles.end());
        }
        const Estimate worst = largest(found);
        step(worst.error);
        estimates_.insert(estimates_.end(), found.begin(), found.end());
        if (fine(worst) && ++passes < 2) continue;
        if (fine(worst) && verify(largest(estimates_))) break;
        if (!fine(worst)) improve(found);
        estimates_.clear();
        passes = 0;
    }
    std::sort(estimates_.begin(), estimates_.end(), [](auto& a, auto& b) { return a.frequency_hz < b.frequency_hz; });
    for (const Estimate& e : estimates_) reflection_error_ = std::max(reflection_error_, e.error * estimate_margin);
    reflection_error_ += verified_margin * verified_error_;
}

void ReducedSweep::note(const SweepPoint& solved) {
    worst_ = worse(worst_, solved.quality);
    fill_s_ += solved.fill_s;
    factor_s_ += solved.factor_s;
    solved_hz_.insert(std::upper_bound(solved_hz_.begin(), solved_hz_.end(), solved.frequency_hz), solved.frequency_hz);
}

void ReducedSweep::solve_at(double frequency_hz) {
    const auto close = [&](double f) { return std::abs(f - frequency_hz) < same_frequency * frequency_hz; };
    if (std::any_of(solved_hz_.begin(), solved_hz_.end(), close)) {
        if (from_hz_ == to_hz_) return;
        throw NumericalError(
            fmt::format("the reduced basis stays wrong at {:.9g} Hz, where it was solved", frequency_hz));
    }
    if (full_solves() >= options_.most_solves)
        throw NumericalError(
            fmt::format("{} solved frequencies do not reach an error of {:.1e}", full_solves(), options_.tolerance));
    const auto start = std::chrono::steady_clock::now();
    MatrixXcd z = affine_->impedance_matrix(on_axis(frequency_hz));
    SweepPoint point;
    point.frequency_hz = frequency_hz;
    point.fill_s = seconds_since(start);
    SolverOptions fast;
    fast.refinement_steps = 0;
    auto factor = std::make_shared<Factor>(Factor{frequency_hz, SymmetricSolver(std::move(z), fast)});
    if (!factor->solver.ok())
        throw NumericalError(
            fmt::format("no solution at {:.6g} Hz: {}", frequency_hz, factor->solver.status().message));
    const MatrixXcd v = affine_->op().port_vectors().cast<Complex>();
    MatrixXcd currents = factor->solver.solve(v);
    currents += factor->solver.solve(v - factor->solver.multiply(currents));
    point.quality = quality_of(factor->solver, currents, v);
    point.factor_s = seconds_since(start) - point.fill_s;
    factors_.push_back(std::move(factor));
    drop_factor();
    note(point);
    model_.add(*affine_, currents);
}

/// Corrects all local maxima of the error at a time, in the order of their size; solves where that is not enough.
void ReducedSweep::improve(const std::vector<Estimate>& found) {
    auto ordered = found;
    std::sort(ordered.begin(), ordered.end(), [](auto& a, auto& b) { return a.frequency_hz < b.frequency_hz; });
    std::vector<Estimate> wrong;
    for (std::size_t i = 0; i < ordered.size(); ++i) {
        const bool peak = (i == 0 || ordered[i].error >= ordered[i - 1].error) &&
                          (i + 1 == ordered.size() || ordered[i].error > ordered[i + 1].error);
        if (peak && ordered[i].error * estimate_margin > options_.tolerance) wrong.push_back(ordered[i]);
    }
    std::sort(wrong.begin(), wrong.end(), [](auto& a, auto& b) { return a.error > b.error; });
    wrong.resize(std::min(wrong.size(), most_corrections));
    if (!enrich(wrong)) solve_at(wrong.front().frequency_hz);
}

// Poles that are none of the antenna appear where directions of the basis cancel; a correction through the nearest
// factorisation, a step of residual inverse iteration [Neumaier1985], removes them without a new one.
bool ReducedSweep::enrich(const std::vector<Estimate>& wrong) {
    if (factors_.size() < fewest_factors) return false;
    std::vector<MatrixXd> directions;
    Index count = 0;
    for (const Estimate& e : wrong) {
        const std::vector<Complex> s{on_axis(e.frequency_hz)};
        const std::vector<MatrixXcd> y{model_.solve(*affine_, s[0])};
        const MatrixXcd correction = nearest_factor(e.frequency_hz).solver.solve(model_.residuals(*affine_, s, y));
        directions.push_back(model_.principal_directions(correction, dominant));
        count += directions.back().cols();
    }
    MatrixXcd all(affine_->op().unknowns(), count);
    for (const MatrixXd& d : directions) {
        all.middleCols(all.cols() - count, d.cols()) = d.cast<Complex>();
        count -= d.cols();
    }
    model_.add(*affine_, all);
    ++enrichments_;
    return estimate({wrong.front().frequency_hz}).front().error < contraction * wrong.front().error;
}

const ReducedSweep::Factor& ReducedSweep::nearest_factor(double frequency_hz) const {
    return **std::min_element(factors_.begin(), factors_.end(), [&](auto& a, auto& b) {
        return std::abs(a->frequency_hz - frequency_hz) < std::abs(b->frequency_hz - frequency_hz);
    });
}

// Keeps within the memory by giving up the factorisation whose neighbours are nearest to each other.
void ReducedSweep::drop_factor() {
    std::sort(factors_.begin(), factors_.end(), [](auto& a, auto& b) { return a->frequency_hz < b->frequency_hz; });
    const double n = affine_->op().unknowns(), each = sizeof(Complex) * n * n;
    if (factors_.size() <= 3 || each * static_cast<double>(factors_.size()) <= options_.factor_memory_bytes) return;
    auto least = factors_.begin() + 1;
    for (auto i = factors_.begin() + 1; i + 1 != factors_.end(); ++i)
        if ((*(i + 1))->frequency_hz - (*(i - 1))->frequency_hz <
            (*(least + 1))->frequency_hz - (*(least - 1))->frequency_hz)
            least = i;
    factors_.erase(least);
}

// An exact fill, so that the interpolation of the matrix is tested with the rest.
bool ReducedSweep::verify(const Estimate& worst) {
    const auto solved_before = [&](double f) { return std::abs(f - worst.frequency_hz) < same_frequency * f; };
    double f = worst.frequency_hz;
    if (std::any_of(solved_hz_.begin(), solved_hz_.end(), solved_before)) f = from_hz_ + 0.381966 * (to_hz_ - from_hz_);
    const SweepPoint exact = solve_point(affine_->op(), f, true);
    verified_error_ = difference(f, admittance_s(f), exact.admittance_s);
    note(exact);
    if (verified_error_ * verified_margin <= options_.tolerance) return true;
    if (full_solves() >= options_.most_solves)
        throw NumericalError(
            fmt::format("an exact solution at {:.6g} Hz differs by {:.1e} from the reduced one", f, verified_error_));
    model_.add(*affine_, exact.currents_a);
    return false;
}

// Even in the square root of frequency: low frequencies need their share.
std::vector<double> ReducedSweep::grid(double shift) const {
    std::vector<double> frequencies;
    const double low = std::sqrt(from_hz_), high = std::sqrt(to_hz_);
    for (int i = 0; i < grid_points; ++i) {
        const double root = low + (high - low) * (i + shift) / (grid_points - 1);
        frequencies.push_back(std::min(root * root, to_hz_));
    }
    return frequencies;
}

/// The poles of the reduced model and the ends of their bands.
std::vector<double> ReducedSweep::pole_grid() const {
    std::vector<double> frequencies;
    for (const ReducedPole& pole : poles()) {
        const double f = pole.frequency_hz(), half_width = std::abs(pole.s.real()) / (2 * constants::pi);
        for (double at : {f, f - half_width, f + half_width})
            if (at >= from_hz_ && at <= to_hz_) frequencies.push_back(at);
    }
    std::sort(frequencies.begin(), frequencies.end());
    return frequencies;
}

std::vector<ReducedSweep::Estimate> ReducedSweep::estimate(const std::vector<double>& frequency_hz) const {
    std::vector<Estimate> found;
    auto first = frequency_hz.begin();
    for (std::size_t i = 0; i < factors_.size(); ++i) {
        const double until =
            i + 1 < factors_.size() ? 0.5 * (factors_[i]->frequency_hz + factors_[i + 1]->frequency_hz) : to_hz_;
        const auto last = std::upper_bound(first, frequency_hz.end(), until);
        std::vector<Complex> s;
        std::vector<MatrixXcd> y;
        for (auto f = first; f != last; ++f) {
            s.push_back(on_axis(*f));
            y.push_back(model_.solve(*affine_, s.back()));
        }
        if (s.empty()) continue;
        const MatrixXcd r = model_.residuals(*affine_, s, y), x = factors_[i]->solver.solve(r);
        const Index p = model_.ports().cols();
        for (std::size_t j = 0; j < s.size(); ++j) {
            const Index column = static_cast<Index>(j) * p;
            const MatrixXcd admittance = model_.ports().transpose() * y[j];
            const MatrixXcd error = r.middleCols(column, p).transpose() * x.middleCols(column, p);
            const double f = *(first + static_cast<std::ptrdiff_t>(j));
            found.push_back({f, difference(f, admittance, admittance + error)});
        }
        first = last;
    }
    return found;
}

std::vector<double> ReducedSweep::shifts() const {
    std::vector<double> shifts;
    for (std::size_t i = 0; i < solved_hz_.size(); ++i) {
        if (i > 0) shifts.push_back(0.5 * (solved_hz_[i - 1] + solved_hz_[i]));
        shifts.push_back(solved_hz_[i]);
    }
    return shifts;
}

std::vector<ReducedPole> ReducedSweep::poles(std::span<const double> termination_ohm) const {
    const BlasThreads threads(1);
    return model_.poles(*affine_, shifts(), termination_ohm);
}

MatrixXcd ReducedSweep::admittance_s(double frequency_hz) const {
    const MatrixXcd y = model_.ports().transpose() * model_.solve(*affine_, on_axis(frequency_hz));
    return 0.5 * (y + y.transpose());
}

MatrixXcd ReducedSweep::currents_a(double frequency_hz) const {
    return model_.basis() * model_.solve(*affine_, on_axis(frequency_hz));
}

double ReducedSweep::reflection_error(double frequency_hz) const {
    const auto above = std::lower_bound(estimates_.begin(), estimates_.end(), frequency_hz,
                                        [](const Estimate& e, double f) { return e.frequency_hz < f; });
    // The estimate has zeros of its own, so two on either side are looked at.
    const auto first = above - std::min<std::ptrdiff_t>(2, above - estimates_.begin());
    const auto last = above + std::min<std::ptrdiff_t>(2, estimates_.end() - above);
    double error = 0;
    for (auto e = first; e != last; ++e) error = std::max(error, e->error);
    return error * estimate_margin + verified_margin * verified_error_;
}

std::vector<SweepPoint> ReducedSweep::evaluate(std::span<const double> frequency_hz, bool keep_currents) const {
    std::vector<SweepPoint> points(frequency_hz.size());
    std::exception_ptr failure;  // none may leave the parallel loop
    const auto evaluate_point = [&](std::size_t i) {
        const MatrixXcd y = model_.solve(*affine_, on_axis(frequency_hz[i]));
        const MatrixXcd admittance = model_.ports().transpose() * y;
        points[i].frequency_hz = frequency_hz[i];
        points[i].admittance_s = 0.5 * (admittance + admittance.transpose());
        points[i].quality = worst_;
        if (keep_currents) points[i].currents_a = model_.basis() * y;
    };
#pragma omp parallel for schedule(static)
    for (std::size_t i = 0; i < points.size(); ++i) try {
            evaluate_point(i);
        } catch (const NumericalError&) {
#pragma omp critical
            failure = std::current_exception();
        }
    if (failure) std::rethrow_exception(failure);
    return points;
}

}  // namespace annulet
