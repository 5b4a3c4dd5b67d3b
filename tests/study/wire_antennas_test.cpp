#include "study/wire_antennas.hpp"

#include <gtest/gtest.h>
#include <annulet/core/constants.hpp>

#include "support/reference_values.hpp"

namespace annulet {
namespace {

constexpr double frequency_hz = constants::c0_m_per_s;  // one metre is one wavelength

TEST(WireAntennas, DipolesSurvey) {
    for (const auto& e : test::reference_values("dipole_impedance")) {
        const double a = e.geometry("a_over_lambda"), l = e.geometry("L_over_lambda");
        const auto z = e.complex("Z_gap_2a");
        std::string line;
        for (double ref : {1., 2., 3., 4.}) {
            const auto s = solve_wires(dipole(l, a, 2 * a), frequency_hz, 30, ref);
            const auto zc = s.impedance_ohm(0, 0);
            char buf[200];
            std::snprintf(buf, 200, " | %3d %6.2f%% R%6.2f%%", s.cells, 100 * std::abs(zc - z) / std::abs(z),
                          100 * (zc.real() / z.real() - 1));
            line += buf;
        }
        std::printf("%s O%g L%g %s%s\n", e.id().c_str(), e.geometry("Omega"), l,
                    e.json.at("tolerance").value("poor_test", false) ? "poor" : "", line.c_str());
    }
}

}  // namespace
}  // namespace annulet
