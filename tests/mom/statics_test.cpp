// Capacitance and inductance from the same static matrices that the full solution uses: power balance does not see
// reactance, these do.
#include <gtest/gtest.h>
#include <annulet/core/constants.hpp>

#include "support/reference_values.hpp"
#include "support/ring_mode.hpp"
#include "support/test_meshes.hpp"

namespace annulet {
namespace {

using test::cosine_nodes;

/// Both meshes halve all cells of cosine spacing: error of order 2, so Richardson takes off a third of the change.
double extrapolated(double coarse, double fine) {
    return fine + (fine - coarse) / 3;
}

const double unit = 4 * constants::pi * constants::eps0_f_per_m;

double plate_capacitance(int n) {
    return test::capacitance_f(Operator(test::plate(1, 1, cosine_nodes(n), cosine_nodes(n)))) / unit;
}

// values.json `cap_square`: 0.366788; Read, J. Comp. Appl. Math. 1997 gives 0.36679 (recalled).
TEST(Statics, CapacitanceOfSquarePlate) {
    const double reference = test::reference_values("cap_square").at(0).real();
    EXPECT_NEAR(extrapolated(plate_capacitance(6), plate_capacitance(12)) / reference, 1, 0.002);
}

double disc_capacitance(int n) {
    return test::capacitance_f(Operator(test::disc(1, n))) / unit;
}

// Kelvin: C = 8 eps0 a, values.json `cap_disc`. The disc is a polygon of chords here, area not corrected: order 2 too.
TEST(Statics, CapacitanceOfDisc) {
    const double reference = test::reference_values("cap_disc").at(0).real();
    EXPECT_NEAR(extrapolated(disc_capacitance(7), disc_capacitance(14)) / reference, 1, 0.002);
}

double annulus_capacitance(double inner, int n) {
    return test::capacitance_f(Operator(test::annulus(inner, 1, 10 * n, cosine_nodes(n)))) / unit;
}

// One-dimensional ring integral equation, methods of Smythe 1951 and Cooke 1958: values.json `cap_annulus`.
TEST(Statics, CapacitanceOfAnnuli) {
    for (const auto& entry : test::reference_values("cap_annulus")) {
        const double inner = entry.geometry("r_in");
        const double value = extrapolated(annulus_capacitance(inner, 3), annulus_capacitance(inner, 6));
        EXPECT_NEAR(value / entry.real(), 1, 0.002) << entry.id();
    }
}

double ring_inductance(double width, int n) {
    const Operator op(test::annulus(1 - width / 2, 1 + width / 2, 12 * n, cosine_nodes(n)));
    return test::ring_inductance_h(op, n) / constants::mu0_h_per_m;
}

// Flux-line integral equation of the flat perfectly conducting ring: values.json `flat_ring_L`; thin limit
// mu0 r (ln(32 r / w) - 2).
TEST(Statics, InductanceOfFlatRings) {
    for (const auto& entry : test::reference_values("flat_ring_L")) {
        const double width = entry.geometry("width");
        const double value = extrapolated(ring_inductance(width, 3), ring_inductance(width, 6));
        EXPECT_NEAR(value / entry.real(), 1, 0.002) << entry.id();
    }
}

}  // namespace
}  // namespace annulet
