#include <gtest/gtest.h>
#include <annulet/core/constants.hpp>
#include <annulet/numerics/quadrature.hpp>
#include <annulet/numerics/special.hpp>

#include <boost/math/special_functions/ellint_1.hpp>
#include <cmath>

#include "support/reference_values.hpp"

namespace annulet {
namespace {

using Complex = std::complex<double>;
using constants::pi;

template <typename F>
auto integral(F f, double a, double b, int n = 60) {
    const LineRule rule = gauss_legendre(n, a, b);
    decltype(f(a)) sum{};
    for (Eigen::Index i = 0; i < rule.nodes.size(); ++i) sum += rule.weights(i) * f(rule.nodes(i));
    return sum;
}

// Abramowitz & Stegun, Handbook of Mathematical Functions, 1964, table 17.1: K(m) and E(m) at m = 0, 0.5, 0.9.
TEST(EllipticIntegrals, PrintedValues) {
    EXPECT_NEAR(elliptic_k_of_complement(1), 1.570796326794897, 1e-15);
    EXPECT_NEAR(elliptic_k_of_complement(0.5), 1.854074677301372, 1e-15);
    EXPECT_NEAR(elliptic_k_of_complement(0.1), 2.578092113348173, 1e-15);
    EXPECT_NEAR(elliptic_e_of_complement(0.5), 1.350643881047675, 1e-15);
    EXPECT_EQ(elliptic_e_of_complement(0), 1);
}

TEST(EllipticIntegrals, LegendreRelation) {  // [Abramowitz1964, 17.3.13]
    for (const double m : {0.01, 0.2, 0.5, 0.77}) {
        const double k = elliptic_k_of_complement(1 - m), k1 = elliptic_k_of_complement(m);
        const double e = elliptic_e_of_complement(1 - m), e1 = elliptic_e_of_complement(m);
        EXPECT_NEAR(e * k1 + e1 * k - k * k1, pi / 2, 1e-14);
    }
}

TEST(EllipticIntegrals, LogarithmIsSplitOff) {
    EXPECT_NEAR(elliptic_k_split(0).regular, std::log(4), 1e-15);
    EXPECT_NEAR(elliptic_k_split(0).slope, 0.5, 1e-15);
    for (const double m1 : {1e-200, 1e-12, 1e-3, 0.1, 0.4999, 0.5001, 0.9, 0.999}) {
        const LogSplit split = elliptic_k_split(m1);
        const double k = elliptic_k_of_complement(m1);
        EXPECT_NEAR(split.regular - split.slope * std::log(m1), k, 4e-15 * k) << m1;
        if (m1 > 1e-3) {
            EXPECT_NEAR(k, boost::math::ellint_1(std::sqrt(1 - m1)), 1e-14 * k);
        }
    }
    EXPECT_NEAR(elliptic_k_split(0.5 - 1e-13).regular, elliptic_k_split(0.5 + 1e-13).regular, 1e-12);
}

// Abramowitz & Stegun 1964, table 5.1 (the values at 1, 2, 5 and 10).
TEST(SineCosineIntegrals, PrintedValues) {
    EXPECT_NEAR(sine_integral(1), 0.9460830704, 5e-11);
    EXPECT_NEAR(cosine_integral(1), 0.3374039229, 5e-11);
    EXPECT_NEAR(sine_integral(2), 1.6054129768, 5e-11);
    EXPECT_NEAR(cosine_integral(2), 0.4229808288, 5e-11);
    EXPECT_NEAR(sine_integral(5), 1.5499312449, 5e-11);
    EXPECT_NEAR(cosine_integral(5), -0.1900297497, 5e-11);
    EXPECT_NEAR(sine_integral(10), 1.6583475942, 5e-11);
    EXPECT_NEAR(cosine_integral(10), -0.0454564330, 5e-11);
}

TEST(SineCosineIntegrals, AgreeWithQuadratureOnBothSidesOfTheSwitch) {
    EXPECT_EQ(sine_integral(0), 0);
    EXPECT_EQ(entire_cosine_integral(0), 0);
    for (const double x : {1e-8, 0.5, 2.999, 3.001, 4.0, 12.0, 30.0}) {
        const auto sine = [](double t) { return std::sin(t) / t; };
        const auto cosine = [](double t) { return 2 * std::pow(std::sin(t / 2), 2) / t; };
        const double rounding = 2e-15 + 2.2e-16 * x;  // the nodes are rounded to x epsilon, int |f'| is about one
        EXPECT_NEAR(sine_integral(x), integral(sine, 0, x), rounding) << x;
        EXPECT_NEAR(entire_cosine_integral(x), integral(cosine, 0, x), 2 * rounding) << x;
        EXPECT_NEAR(entire_cosine_integral(x), 0.57721566490153286 + std::log(x) - cosine_integral(x), 1e-14) << x;
    }
}

TEST(SineCosineIntegrals, LargeArguments) {  // [Abramowitz1964, 5.2.34, 5.2.38, 5.2.39], leading terms
    EXPECT_NEAR(sine_integral(30), 1.566756540030351111, 5e-16);  // 25-digit arithmetic
    const double x = 1e6;
    EXPECT_NEAR(sine_integral(x), pi / 2 - std::cos(x) / x, 2e-12);
    EXPECT_NEAR(cosine_integral(x), std::sin(x) / x, 2e-12);
}

TEST(SphericalBessel, ClosedFormsAndWronskian) {  // [Abramowitz1964, 10.1.11, 10.1.12, 10.1.31]
    const double x = 2.3;
    EXPECT_NEAR(spherical_bessel_j(0, x), std::sin(x) / x, 1e-15);
    EXPECT_NEAR(spherical_bessel_y(1, x), -std::cos(x) / (x * x) - std::sin(x) / x, 1e-15);
    for (int n = 1; n < 12; ++n) {
        const double wronskian = spherical_bessel_j(n, x) * spherical_bessel_y(n - 1, x) -
                                 spherical_bessel_j(n - 1, x) * spherical_bessel_y(n, x);
        EXPECT_NEAR(wronskian * x * x, 1, 1e-13) << n;
    }
    const Complex outgoing = spherical_hankel_outgoing(0, x);  // j e^-jx / x
    EXPECT_LT(std::abs(outgoing - Complex(0, 1) * std::exp(Complex(0, -x)) / x), 1e-15);
}

// I_n(z) = (1/pi) int_0^pi e^{z cos t} cos(n t) dt [Abramowitz1964, 9.6.19], scaled by e^-z against overflow.
Complex ratio_by_quadrature(Complex z) {
    const auto f = [z](int n) {
        return integral([=](double t) { return std::exp(z * (std::cos(t) - 1)) * std::cos(n * t); }, 0, pi, 400);
    };
    return f(0) / f(1);
}

TEST(BesselRatio, AgreesWithTheIntegralRepresentation) {
    for (const double size : {0.01, 0.5, 3.0, 27.9, 28.1, 39.9, 40.1, 200.0})
        for (const double angle : {0.0, pi / 4, 1.2}) {
            const Complex z = std::polar(size, angle);
            const Complex exact = ratio_by_quadrature(z);
            EXPECT_LT(std::abs(bessel_i0_over_i1(z) - exact), 3e-14 * std::abs(exact)) << z;
        }
}

// Z = gamma / (2 pi a sigma) I_0(gamma a) / I_1(gamma a) (Ramo, Whinnery, Van Duzer, Fields and Waves, 1994).
TEST(BesselRatio, InternalImpedanceOfRoundWires) {
    for (const auto& entry : test::reference_values("zint_wire")) {
        const double sigma = entry.geometry("sigma");
        const double radius = entry.geometry("radius_m");
        const Complex gamma = std::sqrt(Complex(0, 2 * pi * entry.geometry("f_Hz") * constants::mu0_h_per_m * sigma));
        const Complex z = gamma / (2 * pi * radius * sigma) * bessel_i0_over_i1(gamma * radius);
        EXPECT_LT(std::abs(z - entry.complex()), 1e-7 * std::abs(z)) << entry.id();
    }
}

}  // namespace
}  // namespace annulet
