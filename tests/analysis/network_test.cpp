// Reflection values: reference values s11_00, _02, _03, _05; definitions of IEEE Std 145-2013 and, for the sign of the
// return loss, Bird, "Definition and misuse of return loss", IEEE Antennas Propag. Mag. 51(2), 2009.
#include <annulet/analysis/network.hpp>
#include <annulet/core/constants.hpp>
#include <annulet/core/diagnostics.hpp>
#include <annulet/model/model.hpp>

#include <gtest/gtest.h>

#include <cmath>

namespace annulet {
namespace {

using Complex = std::complex<double>;
using Eigen::MatrixXcd;

struct ReflectionCase {
    Complex impedance_ohm, gamma;
    double return_loss_db, vswr, mismatch_loss_db;
};

class Reflection : public testing::TestWithParam<ReflectionCase> {};

TEST_P(Reflection, AgreesWithTheDefinitions) {
    const auto& expected = GetParam();
    const auto gamma = reflection(expected.impedance_ohm, 50);
    EXPECT_NEAR(std::abs(gamma - expected.gamma), 0, 1e-6 * std::abs(expected.gamma));
    EXPECT_NEAR(return_loss_db(gamma), expected.return_loss_db, 1e-6 * expected.return_loss_db);
    EXPECT_NEAR(vswr(gamma), expected.vswr, 1e-6 * expected.vswr);
    EXPECT_NEAR(mismatch_loss_db(gamma), expected.mismatch_loss_db, 1e-6 * expected.mismatch_loss_db);
}

INSTANTIATE_TEST_SUITE_P(
    ReferenceValues, Reflection,
    testing::Values(ReflectionCase{{25, 0}, {-0.33333333, 0}, 9.54242509, 2.0, 0.511525224},
                    ReflectionCase{{73.13, 42.54}, {0.27445318, 0.25066809}, 8.59620694, 2.18318013, 0.645728693},
                    ReflectionCase{{120, -30}, {0.4295302, -0.10067114}, 7.10788271, 2.57890523, 0.940050224},
                    ReflectionCase{{50, 50}, {0.2, 0.4}, 6.98970004, 2.61803399, 0.96910013}));

TEST(Vswr, IsInfiniteOfTotalReflection) {
    EXPECT_TRUE(std::isinf(vswr(Complex(0, 1))));
    EXPECT_TRUE(std::isinf(vswr(Complex(1.2, 0))));
}

// Series impedance z between two ports of reference R: S11 = z/(z + 2R), S21 = 2R/(z + 2R)
// [Pozar2012, section 4.3], from memory and by hand from Kirchhoff's laws.
TEST(NetworkPoint, OfASeriesImpedanceBetweenTwoPorts) {
    const Complex z(30, 40), y = 1.0 / z;
    // A shunt at one port lets Z exist; 1e9 ohm is far beyond the tolerance.
    MatrixXcd admittance{{y + 1e-9, -y}, {-y, y}};
    const auto point = network_point(1e9, admittance, {50, 50});
    EXPECT_LT(std::abs(point.scattering(0, 0) - z / (z + 100.0)), 1e-6);
    EXPECT_LT(std::abs(point.scattering(1, 0) - 100.0 / (z + 100.0)), 1e-6);
    EXPECT_LT((point.impedance_ohm * point.admittance_s - MatrixXcd::Identity(2, 2)).norm(), 1e-6);
}

// Unequal references: a plain through has S11 = (R2 - R1)/(R2 + R1), S21 = 2 sqrt(R1 R2)/(R1 + R2) [Kurokawa1965].
TEST(NetworkPoint, OfUnequalReferences) {
    const double big = 1e7;
    MatrixXcd admittance{{Complex(big), Complex(-big)}, {Complex(-big), Complex(big + 1e-7)}};
    const auto point = network_point(1e9, admittance, {50, 75});
    EXPECT_NEAR(point.scattering(0, 0).real(), 0.2, 1e-5);
    EXPECT_NEAR(point.scattering(1, 0).real(), 2 * std::sqrt(50.0 * 75.0) / 125, 1e-5);
    EXPECT_NEAR(point.scattering(1, 1).real(), -0.2, 1e-5);
}

TEST(NetworkPoint, RefusesASingularAdmittance) {
    EXPECT_THROW(network_point(1e9, MatrixXcd::Zero(1, 1), {50}), NumericalError);
}

// pi network of 100 ohm each: port 2 terminated in 100 ohm leaves 100 || (100 + 50) = 60 ohm (Kirchhoff).
TEST(InputImpedance, TerminatesTheOtherPorts) {
    MatrixXcd admittance{{Complex(0.02), Complex(-0.01)}, {Complex(-0.01), Complex(0.02)}};
    EXPECT_NEAR(input_impedance_ohm(admittance, {50, 100}, 0).real(), 60, 1e-9);
    const auto s = network_point(1e9, admittance, {50, 100}).scattering(0, 0);
    EXPECT_LT(std::abs(reflection(Complex(60), 50) - s), 1e-12);
}

// Quarter-wave transformer Z0^2/Z and the half-wave line's identity [Pozar2012, section 2.3].
TEST(BehindLines, QuarterAndHalfWave) {
    const double frequency_hz = 1e9, wavelength_m = 0.66 * constants::c0_m_per_s / frequency_hz;
    MatrixXcd admittance = MatrixXcd::Constant(1, 1, 1.0 / Complex(100, 20));
    const auto seen = [&](double length_m) {
        return 1.0 / behind_lines(frequency_hz, admittance, {FeedLine{75, length_m, 0.66}})(0, 0);
    };
    EXPECT_LT(std::abs(seen(wavelength_m / 4) - 75.0 * 75.0 / Complex(100, 20)), 1e-9);
    EXPECT_LT(std::abs(seen(wavelength_m / 2) - Complex(100, 20)), 1e-9);
    EXPECT_LT(std::abs(seen(0) - Complex(100, 20)), 1e-9);
}

// Z_in = Z0 (Z + j Z0 tan bl)/(Z0 + j Z tan bl) [Pozar2012, equation 2.44].
TEST(BehindLines, AnyLengthAgreesWithTheTangentFormula) {
    const double frequency_hz = 868e6, length_m = 0.0314;
    const Complex load(17, -120), j(0, 1);
    const double tangent = std::tan(2 * constants::pi * frequency_hz * length_m / constants::c0_m_per_s);
    const Complex expected = 50.0 * (load + j * 50.0 * tangent) / (50.0 + j * load * tangent);
    MatrixXcd admittance = MatrixXcd::Constant(1, 1, 1.0 / load);
    const auto seen = behind_lines(frequency_hz, admittance, {FeedLine{50, length_m, 1}});
    EXPECT_LT(std::abs(1.0 / seen(0, 0) - expected), 1e-10);
}

TEST(BehindLines, WithoutLinesNothingChanges) {
    MatrixXcd admittance{{Complex(0.02), Complex(-0.01)}, {Complex(-0.01), Complex(0.02)}};
    EXPECT_EQ(behind_lines(1e9, admittance, {std::nullopt, std::nullopt}), admittance);
}

}  // namespace
}  // namespace annulet
