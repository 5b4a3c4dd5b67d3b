// Zeros of real and complex functions of one variable, and minima of real ones.
#pragma once

#include <complex>
#include <functional>

namespace annulet {

using RealFunction = std::function<double(double)>;
using ComplexFunction = std::function<std::complex<double>(std::complex<double>)>;

/// Zero of `f` in [lower, upper], where its sign must change, to `relative_tolerance` of the root [Alefeld1995].
/// Throws `NumericalError` where the sign does not change or a value is not finite.
double bracketed_root(const RealFunction& f, double lower, double upper, double relative_tolerance = 1e-14);

struct Minimum {
    double x;
    double value;
};

/// A local minimum of `f` in [lower, upper] by golden section and parabolas [Brent1973]; x is good to about the
/// square root of the precision of `f`, and no better.
Minimum local_minimum(const RealFunction& f, double lower, double upper);

/// The smallest of the local minima found from `samples` >= 2 equal pieces of [lower, upper].
Minimum sampled_minimum(const RealFunction& f, double lower, double upper, int samples);

struct ComplexRootOptions {
    double relative_tolerance = 1e-13;  ///< on the last step, relative to |z| + `scale`
    double scale = 0;                   ///< a size below which z counts as zero
    int most_steps = 60;
};

/// Zero near `start` by Newton's method from f and its derivative. Throws `NumericalError` without convergence.
std::complex<double> newton_root(const ComplexFunction& f, const ComplexFunction& derivative,
                                 std::complex<double> start, const ComplexRootOptions& options = {});

/// Zero near three distinct starting values by Muller's method [Muller1956]: needs no derivative, leaves the real
/// axis by itself. Throws `NumericalError` without convergence.
std::complex<double> muller_root(const ComplexFunction& f, std::complex<double> z0, std::complex<double> z1,
                                 std::complex<double> z2, const ComplexRootOptions& options = {});

}  // namespace annulet
