// Symbols: M(s) = s (V^T Z V + sum_p R_p v_p v_p^T), regular at low frequency, l = s^2; x eigenvector.
// Every shift gives a linear problem M(s0) + (l - l0) dM/dl, whose solutions near the shift start Newton's method
// [Ruhe1973]: of an L-C circuit, where M is linear in l, they are exact.
#include <annulet/core/constants.hpp>
#include <annulet/sweep/reduced_basis.hpp>

#include <Eigen/Eigenvalues>
#include <Eigen/LU>

#include <algorithm>
#include <cmath>
#include <optional>

namespace annulet {

using Complex = std::complex<double>;
using Eigen::Index;
using Eigen::MatrixXcd;
using Eigen::VectorXcd;

namespace {

constexpr int most_steps = 25;
constexpr double settled = 1e-12;  ///< relative step of s
constexpr double largest_damping = 0.5;

struct Scaled {
    MatrixXcd value, slope;
};

class PoleSearch {
public:
    PoleSearch(const ReducedModel& model, const AffineOperator& affine, std::span<const double> termination_ohm)
        : model_(model), affine_(affine) {
        loads_ = MatrixXcd::Zero(model.size(), model.size());
        for (std::size_t p = 0; p < termination_ohm.size(); ++p) {
            const Eigen::VectorXd v = model.ports().col(static_cast<Index>(p));
            loads_ += (termination_ohm[p] * v * v.transpose()).cast<Complex>();
        }
    }

    /// Eigenpairs of the problem linearised at s0 whose frequency lies in [low, high].
    std::vector<ReducedPole> near(Complex s0, double low_hz, double high_hz) const {
        const Scaled m = at(s0);
        // (M + (l - l0) M_l) x = 0: eigenvalues of M^-1 M_l are -1/(l - l0), M_l = M'/(2 s).
        const Eigen::ComplexEigenSolver<MatrixXcd> eigen(m.value.partialPivLu().solve(m.slope / (2.0 * s0)));
        std::vector<ReducedPole> found;
        if (eigen.info() != Eigen::Success) return found;
        for (Index i = 0; i < eigen.eigenvalues().size(); ++i) {
            Complex s = std::sqrt(s0 * s0 - 1.0 / eigen.eigenvalues()[i]);
            if (s.imag() < 0) s = -s;
            ReducedPole pole{s, eigen.eigenvectors().col(i)};
            if (pole.frequency_hz() >= low_hz && pole.frequency_hz() <= high_hz &&
                std::abs(s.real()) < largest_damping * std::abs(s))
                found.push_back(std::move(pole));
        }
        return found;
    }

    /// Newton's method with the bilinear Rayleigh functional x^T M x = 0 of complex symmetric matrices.
    std::optional<ReducedPole> polish(ReducedPole pole) const {
        for (int step = 0; step < most_steps; ++step) {
            const Scaled m = at(pole.s);
            const VectorXcd x = m.value.partialPivLu().solve(m.slope * pole.vector).normalized();
            if (!x.allFinite()) return pole;  // exactly on the eigenvalue
            const Complex down = (x.transpose() * m.slope * x).value();
            const Complex change = (x.transpose() * m.value * x).value() / down;
            if (!std::isfinite(std::abs(change)) || std::abs(change) > std::abs(pole.s)) return std::nullopt;
            pole = {pole.s - change, x};
            if (std::abs(change) < settled * std::abs(pole.s)) return pole;
        }
        return std::nullopt;
    }

private:
    Scaled at(Complex s) const {
        const MatrixXcd z = model_.matrix(affine_, s) + loads_;
        return {s * z, z + s * model_.derivative(affine_, s)};
    }

    const ReducedModel& model_;
    const AffineOperator& affine_;
    MatrixXcd loads_;
};

bool known(const std::vector<ReducedPole>& poles, const ReducedPole& other) {
    return std::any_of(poles.begin(), poles.end(), [&](const ReducedPole& p) {
        return std::abs(p.s - other.s) < 1e-9 * std::abs(p.s) &&
               std::abs(p.vector.dot(other.vector)) > 0.99;  // double poles have independent vectors
    });
}

}  // namespace

std::vector<ReducedPole> ReducedModel::poles(const AffineOperator& affine, std::span<const double> shift_hz,
                                             std::span<const double> termination_ohm) const {
    std::vector<ReducedPole> found;
    if (size() == 0 || shift_hz.size() < 2) return found;
    const PoleSearch search(*this, affine, termination_ohm);
    for (std::size_t i = 0; i < shift_hz.size(); ++i) {
        const double low = shift_hz[i > 0 ? i - 1 : 0], high = shift_hz[std::min(i + 1, shift_hz.size() - 1)];
        for (const ReducedPole& start : search.near(Complex(0, 2 * constants::pi * shift_hz[i]), low, high)) {
            const auto pole = search.polish(start);
            if (!pole || std::abs(pole->s.real()) > largest_damping * std::abs(pole->s)) continue;
            const double f = pole->frequency_hz();
            if (f >= shift_hz.front() && f <= shift_hz.back() && !known(found, *pole)) found.push_back(*pole);
        }
    }
    std::sort(found.begin(), found.end(), [](const auto& a, const auto& b) { return a.s.imag() < b.s.imag(); });
    return found;
}

}  // namespace annulet
