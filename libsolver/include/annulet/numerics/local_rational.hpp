// A complex curve known at points, continued between them by local rational interpolation.
#pragma once

#include <complex>
#include <cstddef>
#include <vector>

namespace annulet {

/// In every interval the rational function of type (3, 3) through its two ends that fits the eight nearest
/// points best (fewer points: lower type). Exact for curves of a single resonator such as the reflection of an
/// R-L-C circuit. Barycentric form with weights from the Loewner matrix [Nakatsukasa2018, section 3].
class LocalRational {
public:
    /// `x` strictly ascending, at least one point; `y` of the same length.
    LocalRational(std::vector<double> x, std::vector<std::complex<double>> y);

    const std::vector<double>& x() const { return x_; }
    const std::vector<std::complex<double>>& y() const { return y_; }

    /// At `at` inside the points; outside, the nearest interval is continued.
    std::complex<double> value(double at) const;
    /// First derivative with respect to x [Schneider1986].
    std::complex<double> derivative(double at) const;

private:
    struct Piece {
        std::vector<std::size_t> support;
        std::vector<std::complex<double>> weight;
    };
    Piece make_piece(std::size_t interval) const;
    Piece polynomial_piece(std::size_t interval) const;
    bool runs_away(const Piece& piece, std::size_t interval) const;
    const Piece& piece_at(double at) const;
    std::complex<double> value(const Piece& piece, double at) const;

    std::vector<double> x_;
    std::vector<std::complex<double>> y_;
    std::vector<Piece> pieces_;
};

}  // namespace annulet
