#include "mom/surface_impedance.hpp"

#include <gtest/gtest.h>
#include <annulet/core/constants.hpp>

#include <cmath>

#include "support/reference_values.hpp"

namespace annulet {
namespace {

// Plane wave in a slab, two faces: values.json `zfoil` (Zs = (gamma / 2 sigma) coth(gamma t / 2)).
TEST(SurfaceImpedance, FoilOfFiniteThickness) {
    for (const auto& entry : test::reference_values("zfoil")) {
        Conductor foil;
        foil.conductivity_s_per_m = entry.geometry("sigma");
        foil.thickness_m = entry.geometry("t_m");
        const auto z = sheet_impedance(foil, entry.geometry("f_Hz")), reference = entry.complex("two_face");
        EXPECT_LT(std::abs(z - reference), 1e-6 * std::abs(reference)) << entry.id();
    }
}

// Direct-current limit: 1 / (sigma t). Thick limit: half of Rs (1 + j), Rs = sqrt(pi f mu0 / sigma) [Ramo1994].
TEST(SurfaceImpedance, Limits) {
    Conductor foil;
    foil.conductivity_s_per_m = 5.8e7;
    foil.thickness_m = 35e-6;
    EXPECT_NEAR(sheet_impedance(foil, 10).real() * 5.8e7 * 35e-6, 1, 1e-9);
    for (const auto& entry : test::reference_values("surface_R")) {
        Conductor thick;
        thick.conductivity_s_per_m = entry.geometry("sigma");
        const auto z = sheet_impedance(thick, entry.geometry("f_Hz"));
        EXPECT_NEAR(2 * z.real() / entry.real("Rs"), 1, 1e-6) << entry.id();
        EXPECT_DOUBLE_EQ(z.real(), z.imag());
        EXPECT_NEAR(skin_depth_m(thick.conductivity_s_per_m, entry.geometry("f_Hz")) / entry.real("delta_m"), 1, 1e-6);
    }
    EXPECT_EQ(sheet_impedance(Conductor{}, 1e9), std::complex<double>(0));
}

// values.json `zint_wire`: [Ramo1994], ratio of Bessel functions.
TEST(SurfaceImpedance, RoundWire) {
    for (const auto& e : test::reference_values("zint_wire")) {
        Conductor c;
        c.conductivity_s_per_m = e.geometry("sigma");
        const auto z = wire_impedance_per_m(c, e.geometry("radius_m"), e.geometry("f_Hz"));
        EXPECT_LT(std::abs(z - e.complex()), 1e-4 * std::abs(e.complex())) << e.id();
    }
}

// Hammerstad & Jensen 1980, values.json `roughness`.
TEST(SurfaceImpedance, RoughnessFactor) {
    for (const auto& entry : test::reference_values("roughness")) {
        const double delta = skin_depth_m(entry.geometry("sigma"), entry.geometry("f_Hz"));
        EXPECT_NEAR(roughness_factor(entry.geometry("rms_m"), delta) / entry.real(), 1, 1e-6) << entry.id();
    }
}

TEST(PartImpedance, SeriesElementsAndParasitics) {
    const double w = 2 * constants::pi * 1e9;
    Lumped part;
    part.resistance_ohm = 3;
    part.inductance_h = 5e-9;
    part.capacitance_f = 2e-12;
    const auto z = part_impedance(part, 1e9);
    EXPECT_NEAR(z.real(), 3, 1e-12);
    EXPECT_NEAR(z.imag(), w * 5e-9 - 1 / (w * 2e-12), 1e-9);
    Lumped coil;
    coil.inductance_h = 10e-9;
    coil.quality = 40;
    coil.quality_at_hz = 1e9;
    EXPECT_NEAR(part_impedance(coil, 1e9).real(), w * 10e-9 / 40, 1e-9);
    coil.quality.reset();
    coil.self_resonance_hz = 3e9;  // below it X = wL / (1 - (f/f0)^2)
    EXPECT_NEAR(part_impedance(coil, 1e9).imag(), w * 10e-9 / (1 - 1.0 / 9), 1e-9);
    Lumped capacitor;
    capacitor.capacitance_f = 1e-12;
    capacitor.self_resonance_hz = 4e9;
    EXPECT_NEAR(part_impedance(capacitor, 4e9).imag(), 0, 1e-9);
}

}  // namespace
}  // namespace annulet
