// Relative permittivity of a sheet over (complex) frequency.
#pragma once

#include <annulet/model/model.hpp>

#include <complex>
#include <vector>

namespace annulet {

/// Causal logarithmic model [Svensson2001]: eps(s) = eps_inf + b ln((w2 + s)/(w1 + s)), with loss nearly constant
/// between w1 and w2 = 2 pi 10 kHz and 1 THz, through the given permittivity and loss tangent. A table of several
/// points is followed by linear interpolation over log frequency of eps_inf, so that eps passes every point.
/// Anisotropic sheets: the effective isotropic sqrt(eps_z eps_xy).
class Permittivity {
public:
    explicit Permittivity(const Laminate& laminate);
    /// At s = j w, or complex s near the imaginary axis (1/s); conj(eps(s)) = eps(conj s).
    std::complex<double> operator()(std::complex<double> s) const;

private:
    struct Point {
        double log_w = 0, eps_inf = 1, b = 0;
    };
    std::vector<Point> points_;
};

/// 1 / (s eps0 (eps_r(s) - 1)), ohm metre: what the polarisation mass is multiplied by.
std::complex<double> polarisation_factor(const Permittivity& permittivity, std::complex<double> s);

}  // namespace annulet
