#include <annulet/numerics/local_rational.hpp>

#include <Eigen/SVD>

#include <algorithm>
#include <cmath>
#include <utility>

namespace annulet {
namespace {

using Complex = std::complex<double>;
using Index = Eigen::Index;
constexpr std::size_t window_points = 8;

/// The points nearest to an interval, its two ends first, then outwards.
std::vector<std::size_t> nearest_points(const std::vector<double>& x, std::size_t interval, std::size_t most) {
    std::vector<std::size_t> chosen{interval, interval + 1};
    std::size_t below = interval, above = interval + 2;
    const double middle = 0.5 * (x[interval] + x[interval + 1]);
    while (chosen.size() < most && (below > 0 || above < x.size())) {
        const bool take_below = below > 0 && (above >= x.size() || middle - x[below - 1] <= x[above] - middle);
        chosen.push_back(take_below ? --below : above++);
    }
    return chosen;
}

/// Null vector of the Loewner matrix L_ij = (y_i - y_j)/(x_i - x_j), i over tests, j over the support.
std::vector<Complex> loewner_weights(const std::vector<double>& x, const std::vector<Complex>& y,
                                     const std::vector<std::size_t>& test, const std::vector<std::size_t>& support) {
    Eigen::MatrixXcd loewner(static_cast<Index>(test.size()), static_cast<Index>(support.size()));
    for (std::size_t i = 0; i < test.size(); ++i)
        for (std::size_t j = 0; j < support.size(); ++j)
            loewner(static_cast<Index>(i), static_cast<Index>(j)) =
                (y[test[i]] - y[support[j]]) / (x[test[i]] - x[support[j]]);
    const Eigen::JacobiSVD<Eigen::MatrixXcd> svd(loewner, Eigen::ComputeFullV);
    const Eigen::VectorXcd null_vector = svd.matrixV().rightCols<1>();
    return {null_vector.begin(), null_vector.end()};
}

}  // namespace

LocalRational::LocalRational(std::vector<double> x, std::vector<Complex> y) : x_(std::move(x)), y_(std::move(y)) {
    for (std::size_t interval = 0; interval + 1 < x_.size(); ++interval) pieces_.push_back(make_piece(interval));
}

LocalRational::Piece LocalRational::make_piece(std::size_t interval) const {
    const auto points = nearest_points(x_, interval, window_points);
    if (points.size() < 3) return polynomial_piece(interval);
    Piece piece;
    std::vector<std::size_t> test;
    // One point more in the support than among the tests keeps the null space one-dimensional.
    for (std::size_t i = 0; i < points.size(); ++i) {
        const bool supports = i < 2 || (i % 2 == 1 && i > 2);
        (supports ? piece.support : test).push_back(points[i]);
    }
    while (test.size() + 1 < piece.support.size()) piece.support.pop_back();
    piece.weight = loewner_weights(x_, y_, test, piece.support);
    return runs_away(piece, interval) ? polynomial_piece(interval) : piece;
}

LocalRational::Piece LocalRational::polynomial_piece(std::size_t interval) const {
    Piece piece{nearest_points(x_, interval, 4), {}};
    for (const auto j : piece.support) {
        double product = 1;
        for (const auto other : piece.support)
            if (other != j) product *= (x_[j] - x_[other]) / (x_[interval + 1] - x_[interval]);
        piece.weight.emplace_back(1 / product);
    }
    return piece;
}

/// A pole of the fit on the interval, which no passive curve has, shows as values far outside its surroundings.
bool LocalRational::runs_away(const Piece& piece, std::size_t interval) const {
    double largest = 0;
    for (const auto j : piece.support) largest = std::max(largest, std::abs(y_[j]));
    constexpr int probes = 16;
    for (int i = 1; i < probes; ++i) {
        const double at = x_[interval] + (x_[interval + 1] - x_[interval]) * i / probes;
        const double size = std::abs(value(piece, at));
        if (!std::isfinite(size) || size > 2 * largest) return true;
    }
    return false;
}

const LocalRational::Piece& LocalRational::piece_at(double at) const {
    const auto above = std::upper_bound(x_.begin(), x_.end(), at) - x_.begin();
    const auto last = static_cast<std::ptrdiff_t>(pieces_.size()) - 1;
    return pieces_[static_cast<std::size_t>(std::clamp<std::ptrdiff_t>(above - 1, 0, last))];
}

Complex LocalRational::value(const Piece& piece, double at) const {
    Complex numerator = 0, denominator = 0;
    for (std::size_t i = 0; i < piece.support.size(); ++i) {
        const auto j = piece.support[i];
        if (at == x_[j]) return y_[j];
        const Complex term = piece.weight[i] / (at - x_[j]);
        numerator += term * y_[j];
        denominator += term;
    }
    return numerator / denominator;
}

Complex LocalRational::value(double at) const {
    return pieces_.empty() ? y_.front() : value(piece_at(at), at);
}

Complex LocalRational::derivative(double at) const {
    if (pieces_.empty()) return 0;
    const Piece& piece = piece_at(at);
    const Complex here = value(piece, at);
    Complex numerator = 0, denominator = 0, own_weight = 0;
    bool on_support = false;
    for (std::size_t i = 0; i < piece.support.size(); ++i) {
        if (at == x_[piece.support[i]]) {
            on_support = true;
            own_weight = piece.weight[i];
        }
    }
    for (std::size_t i = 0; i < piece.support.size(); ++i) {
        const auto j = piece.support[i];
        if (at == x_[j]) continue;
        const Complex slope = (here - y_[j]) / (at - x_[j]);
        numerator += (on_support ? piece.weight[i] : piece.weight[i] / (at - x_[j])) * slope;
        denominator += piece.weight[i] / (at - x_[j]);
    }
    return on_support ? -numerator / own_weight : numerator / denominator;
}

}  // namespace annulet
