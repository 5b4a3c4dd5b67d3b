// The circular loop of thin perfectly conducting round wire by Fourier series [Storer1956, Wu1962, King1969].
#pragma once

#include <Eigen/Core>

#include <complex>
#include <vector>

namespace annulet::test {

/// A loop of radius b of wire of radius a, fed by a uniform field over a gap of finite length.
struct ThinLoop {
    double radius_m;
    double wire_radius_m;
    double gap_m;

    /// Ratio of circumference to wavelength, k b.
    double kb(double frequency_hz) const;
    double frequency_hz(double kb) const;
};

/// Coefficients a_n, n = 0 ... count - 1, of the loop with wavenumber times radius `kb` (complex for natural modes;
/// e^{+j omega t}, decaying modes have Im kb > 0; |kb| < 25) and `b_over_a` > 5:
/// a_n = kb/2 (N_{n+1} + N_{n-1}) - n^2/kb N_n, with N_n the Fourier coefficients of b e^{-jkR}/R averaged around
/// the wire ([King1969] eqs. 11-15; static part in the closed form of [Wu1962], error of order (a/b)^2 ln).
Eigen::VectorXcd loop_coefficients(std::complex<double> kb, double b_over_a, int count);

/// N_n by direct quadrature of the kernel with R^2 = 4 b^2 sin^2(phi/2) + 4 a^2 sin^2(psi/2), for checks.
std::complex<double> loop_kernel_by_quadrature(std::complex<double> kb, double b_over_a, int n);

/// Current harmonics for unit gap voltage, A: I(phi) = sum_n I_n cos(n phi), phi from the feed. `count` 0: enough for
/// the gap that the impedance is exact to 1e-6.
Eigen::VectorXcd loop_current(const ThinLoop& loop, double frequency_hz, int count = 0);

/// Gap voltage over the mean current of the gap, ohm.
std::complex<double> loop_impedance(const ThinLoop& loop, double frequency_hz);

/// Directivity (linear) along the axis of the loop.
double loop_axis_directivity(const ThinLoop& loop, double frequency_hz);

/// Frequency of the zero of the input reactance within `lower_kb` < kb < `upper_kb`, Hz.
double loop_resonance_hz(const ThinLoop& loop, double lower_kb = 0.9, double upper_kb = 1.35);

/// kb at which Re a_n = 0 near kb = n: resonance of the closed ring with the current cos(n phi).
double ring_resonance_kb(double b_over_a, int n);

/// Complex kb of the natural mode cos(n phi), a_n(kb) = 0; s = j kb c0 / b.
std::complex<double> ring_natural_kb(double b_over_a, int n);

}  // namespace annulet::test
