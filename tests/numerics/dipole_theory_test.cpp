#include "support/dipole_theory.hpp"

#include <gtest/gtest.h>
#include <annulet/core/constants.hpp>
#include <annulet/numerics/special.hpp>

#include <cmath>

#include "support/reference_values.hpp"

namespace annulet::test {
namespace {

using Complex = std::complex<double>;
using constants::pi;

// Carter 1932 and King 1957; every entry carries its source.
TEST(DipoleTheory, MutualImpedances) {
    for (const auto& entry : reference_values("mutual_side")) {
        const double length = entry.geometry("L_over_lambda");
        const double spacing = entry.geometry("spacing_over_lambda");
        EXPECT_LT(std::abs(mutual_dipole_impedance(length, length, spacing, 0) - entry.complex()), 1e-5) << entry.id();
    }
    for (const auto& entry : reference_values("mutual_collinear")) {
        const double length = entry.geometry("L_over_lambda");
        const double stagger = length + entry.geometry("end_gap_over_lambda");
        EXPECT_LT(std::abs(mutual_dipole_impedance(length, length, 0, stagger) - entry.complex()), 1e-5) << entry.id();
    }
    for (const auto& entry : reference_values("mutual_echelon")) {
        const double length = entry.geometry("L_over_lambda");
        const Complex z = mutual_dipole_impedance(length, length, entry.geometry("dx"), entry.geometry("dz"));
        EXPECT_LT(std::abs(z - entry.complex()), 1e-5) << entry.id();
    }
}

TEST(DipoleTheory, ClosedFormAgreesWithQuadrature) {
    for (const double spacing : {1e-4, 0.01, 0.25, 1.0, 2.7})
        EXPECT_LT(std::abs(mutual_dipole_impedance(0.5, 0.5, spacing, 0) - mutual_half_wave_side_by_side(spacing)),
                  1e-9)
            << spacing;
}

TEST(DipoleTheory, MutualImpedanceIsReciprocal) {
    const Complex z12 = mutual_dipole_impedance(0.5, 0.4, 0.2, 0.3);
    EXPECT_LT(std::abs(z12 - mutual_dipole_impedance(0.4, 0.5, 0.2, -0.3)), 1e-9);
}

// R = (eta/4pi) Cin(2 pi), X = (eta/4pi) Si(2 pi) of the filament (Carter 1932).
TEST(DipoleTheory, HalfWaveSelfImpedance) {
    const auto thin = reference_value("dipole_thin_00");
    const Complex filament =
        constants::eta0_ohm / (4 * pi) * Complex(entire_cosine_integral(2 * pi), sine_integral(2 * pi));
    EXPECT_LT(std::abs(filament - thin.complex()), 1e-5);
    for (const auto& entry : reference_values("dipole_emf")) {
        const double length = entry.geometry("L_over_lambda");
        const Complex z = mutual_dipole_impedance(length, length, entry.geometry("a_over_lambda"), 0);
        EXPECT_LT(std::abs(z - entry.complex()), 1e-5) << entry.id();
    }
}

TEST(DipoleTheory, LinesAndStepUp) {
    for (const auto& entry : reference_values("two_wire_line")) {
        const bool equal = entry.has_geometry("wire_radius");
        const double a1 = entry.geometry(equal ? "wire_radius" : "a1");
        const double a2 = entry.geometry(equal ? "wire_radius" : "a2");
        EXPECT_NEAR(two_wire_impedance(a1, a2, entry.geometry("spacing")) / entry.real(), 1, 1e-8) << entry.id();
    }
    for (const auto& entry : reference_values("stepup")) {
        const double ratio =
            step_up_ratio(entry.geometry("a_driven"), entry.geometry("a_other"), entry.geometry("spacing"));
        EXPECT_NEAR(ratio, entry.real(), 1e-8 * ratio) << entry.id();
    }
}

TEST(DipoleTheory, GroverInductances) {
    for (const auto& entry : reference_values("ring_inductance"))
        EXPECT_NEAR(ring_inductance_over_mu0(entry.geometry("b"), entry.geometry("a")), entry.real(), 1e-7);
    for (const auto& entry : reference_values("rect_inductance"))
        EXPECT_NEAR(rectangle_inductance_over_mu0(entry.geometry("x"), entry.geometry("y"), entry.geometry("a")),
                    entry.real(), 1e-7);
    for (const auto& entry : reference_values("square_inductance")) {
        const double side = entry.geometry("side");
        // Grover prints the constant 0.77401 of the square to five digits.
        EXPECT_NEAR(rectangle_inductance_over_mu0(side, side, entry.geometry("a")), entry.real(), 5e-6);
    }
    for (const auto& entry : reference_values("strip_inductance")) {
        const double length_mm = entry.geometry("l_mm");
        const double inductance_nh =
            constants::mu0_h_per_m * 1e6 * strip_inductance_over_mu0(length_mm, entry.geometry("w_mm"));
        EXPECT_NEAR(inductance_nh / entry.real("grover_nH"), 1, 1e-8) << entry.id();
    }
}

}  // namespace
}  // namespace annulet::test
