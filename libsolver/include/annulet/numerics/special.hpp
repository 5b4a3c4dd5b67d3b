// Special functions of the kernels and of the reference solutions.
#pragma once

#include <complex>

namespace annulet {

/// Complete elliptic integral of the first kind of the *complementary* parameter m1 = 1 - k^2 in (0, 1], so that
/// nothing is lost next to the logarithmic singularity at m1 = 0 [Abramowitz1964, 17.3.1, 17.3.3].
double elliptic_k_of_complement(double m1);

/// Complete elliptic integral of the second kind of m1 in [0, 1].
double elliptic_e_of_complement(double m1);

/// K(1 - m1) = regular - slope ln(m1), both analytic in m1; at m1 = 0 they are ln 4 and 1/2 [Abramowitz1964, 17.3.21
/// ff].
struct LogSplit {
    double regular;
    double slope;
};
/// m1 in [0, 1]; relative error below 1e-14.
LogSplit elliptic_k_split(double m1);

/// Sine integral, x >= 0 [Abramowitz1964, 5.2.1]; absolute error below 4e-16 times max(1, value).
double sine_integral(double x);
/// Cosine integral, x > 0 [Abramowitz1964, 5.2.2].
double cosine_integral(double x);
/// Entire cosine integral Cin(x) = int_0^x (1 - cos t)/t dt = gamma + ln x - Ci(x), x >= 0 [Abramowitz1964, 5.2.2].
double entire_cosine_integral(double x);

/// Spherical Bessel functions of order n >= 0 and x > 0 (x = 0 allowed for j) [Abramowitz1964, 10.1.1].
double spherical_bessel_j(int n, double x);
double spherical_bessel_y(int n, double x);
/// h_n = j_n - j y_n, the outgoing wave for e^{+j omega t}.
std::complex<double> spherical_hankel_outgoing(int n, double x);

/// I_0(z) / I_1(z), Re z >= 0, z != 0, to 1e-14: continued fraction, for large |z| away from the imaginary axis
/// the asymptotic series [Abramowitz1964, 9.1.73 with 9.6.3; 9.7.1].
std::complex<double> bessel_i0_over_i1(std::complex<double> z);

}  // namespace annulet
