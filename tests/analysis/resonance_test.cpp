// Closed forms of R-L-C circuits. Matched-VSWR bandwidth and Q_Z: Yaghjian and Best, "Impedance, bandwidth, and Q of
// antennas", IEEE Trans. Antennas Propag. 53(4), 2005: FBW = (s - 1)/(sqrt(s) Q), exact for the series circuit;
// reference values q_vswr_00, _02, _03.
#include <annulet/analysis/network.hpp>
#include <annulet/core/constants.hpp>

#include <gtest/gtest.h>

#include <cmath>
#include <functional>

namespace annulet {
namespace {

using Complex = std::complex<double>;
constexpr double f0 = 868.3e6;

PortCurve curve_of(const std::function<Complex(double)>& impedance, double from_hz, double to_hz, int points) {
    PortCurve curve;
    curve.port = "feed";
    for (int i = 0; i < points; ++i) {
        curve.frequency_hz.push_back(from_hz + (to_hz - from_hz) * i / (points - 1));
        curve.impedance_ohm.push_back(impedance(curve.frequency_hz.back()));
    }
    return curve;
}

auto series_circuit(double resistance_ohm, double q) {
    return [=](double f) { return resistance_ohm * Complex(1, q * (f / f0 - f0 / f)); };
}
auto parallel_circuit(double resistance_ohm, double q) {
    return [=](double f) { return resistance_ohm / Complex(1, q * (f / f0 - f0 / f)); };
}

const Resonance* find_kind(const std::vector<Resonance>& found, ResonanceKind kind) {
    for (const auto& resonance : found)
        if (resonance.kind == kind) return &resonance;
    return nullptr;
}

struct BandwidthCase {
    double q, vswr, fraction;
};
class MatchedSeriesCircuit : public testing::TestWithParam<BandwidthCase> {};

TEST_P(MatchedSeriesCircuit, HasTheBandwidthOfYaghjianAndBest) {
    const auto& expected = GetParam();
    const auto found = find_resonances(curve_of(series_circuit(50, expected.q), 500e6, 1500e6, 101), expected.vswr);
    const auto* series = find_kind(found, ResonanceKind::series);
    ASSERT_NE(series, nullptr);
    EXPECT_NEAR(series->bandwidth_hz / f0, expected.fraction, 1e-6 * expected.fraction);
    EXPECT_NEAR(series->q, expected.q, 1e-6 * expected.q);
    EXPECT_NEAR(series->frequency_hz, f0, 1);
    EXPECT_NEAR(series->resistance_ohm, 50, 1e-6);
}

INSTANTIATE_TEST_SUITE_P(ReferenceValues, MatchedSeriesCircuit,
                         testing::Values(BandwidthCase{10, 2, 0.0707106781}, BandwidthCase{50, 1.5, 0.00816496581},
                                         BandwidthCase{8, 5.828, 0.249987045}));

TEST(FindResonances, SeriesCircuitGivesSeriesAndMatchOnly) {
    const auto found = find_resonances(curve_of(series_circuit(50, 10), 500e6, 1500e6, 101), 2);
    ASSERT_EQ(found.size(), 2u);
    EXPECT_NE(find_kind(found, ResonanceKind::series), nullptr);
    const auto* match = find_kind(found, ResonanceKind::match);
    ASSERT_NE(match, nullptr);
    EXPECT_NEAR(match->frequency_hz, f0, 10);
    EXPECT_LE(found[0].frequency_hz, found[1].frequency_hz);
}

TEST(FindResonances, ParallelCircuitIsToldFromSeries) {
    const auto found = find_resonances(curve_of(parallel_circuit(300, 40), 500e6, 1500e6, 201), 2);
    const auto* parallel = find_kind(found, ResonanceKind::parallel);
    ASSERT_NE(parallel, nullptr);
    EXPECT_EQ(find_kind(found, ResonanceKind::series), nullptr);
    EXPECT_NEAR(parallel->frequency_hz, f0, 1);
    EXPECT_NEAR(parallel->resistance_ohm, 300, 1e-4);
    EXPECT_NEAR(parallel->q, 40, 40 * 1e-6);
    EXPECT_EQ(parallel->bandwidth_hz, 0);  // 300 ohm is VSWR 6 in 50 ohm
}

// |S11| of a series circuit with R = 2 R0 has its minimum, 1/3, at the resonance.
TEST(FindResonances, FarFromMatchTheGoalIsNeverMet) {
    const auto found = find_resonances(curve_of(series_circuit(100, 20), 500e6, 1500e6, 101), 1.9);
    const auto* match = find_kind(found, ResonanceKind::match);
    ASSERT_NE(match, nullptr);
    EXPECT_EQ(match->bandwidth_hz, 0);
    EXPECT_NEAR(match->frequency_hz, f0, 10);
}

// Resonances stay sharp when only a few points fall on them: exactness of the interpolation for one resonator.
TEST(FindResonances, ANarrowResonanceBetweenGridPointsIsFound) {
    const auto found = find_resonances(curve_of(series_circuit(50, 300), 600e6, 1200e6, 21), 2);
    const auto* series = find_kind(found, ResonanceKind::series);
    ASSERT_NE(series, nullptr);
    EXPECT_NEAR(series->frequency_hz, f0, 1e3);
    EXPECT_NEAR(series->q, 300, 0.3);
}

// A series arm and a tank in series: reactance rises through zero, falls at the tank, rises again; the zeros found are
// put back into the circuit.
TEST(FindResonances, SeriesAndParallelInTurn) {
    const auto first = series_circuit(20, 15);
    const auto second = parallel_circuit(4000, 12);
    const auto both = [&](double f) { return first(f) + second(f * 0.6); };
    const auto found = find_resonances(curve_of(both, 400e6, 2500e6, 401), 2);
    int zeros = 0;
    for (const auto& resonance : found) {
        if (resonance.kind == ResonanceKind::match) continue;
        ++zeros;
        EXPECT_NEAR(both(resonance.frequency_hz).imag(), 0, 1e-3) << resonance.frequency_hz;
        const double slope = (both(resonance.frequency_hz + 1e3) - both(resonance.frequency_hz - 1e3)).imag();
        EXPECT_EQ(slope > 0, resonance.kind == ResonanceKind::series);
    }
    EXPECT_EQ(zeros, 3);
}

TEST(FindResonances, BandwidthEndsWhereTheSweepEnds) {
    const auto found = find_resonances(curve_of(series_circuit(50, 10), 860e6, 900e6, 41), 2);
    const auto* series = find_kind(found, ResonanceKind::series);
    ASSERT_NE(series, nullptr);
    // Upper edge u - 1/u = 1/(sqrt 2 Q), beyond 890 MHz; lower edge outside the sweep.
    const double half = 0.5 / (std::sqrt(2.0) * 10);
    const double upper = std::min(900e6, f0 * (half + std::sqrt(1 + half * half)));
    EXPECT_NEAR(series->bandwidth_hz, upper - 860e6, 100);
}

TEST(FindResonances, ConstantImpedanceHasNone) {
    EXPECT_TRUE(find_resonances(curve_of([](double) { return Complex(75, 10); }, 1e8, 1e9, 50), 2).empty());
    EXPECT_TRUE(find_resonances(curve_of(series_circuit(50, 10), f0, f0, 1), 2).empty());
}

TEST(BandMatch, IsWorstAtTheFartherEdge) {
    const auto curve = curve_of(series_circuit(50, 10), 500e6, 1500e6, 101);
    const auto match = band_match(curve, 863e6, 870e6);
    ASSERT_TRUE(match);
    EXPECT_EQ(match->worst_at_hz, 863e6);
    EXPECT_NEAR(match->worst_vswr, vswr(reflection(series_circuit(50, 10)(863e6), 50)), 1e-9);
}

TEST(BandMatch, NeedsTheWholeBand) {
    const auto curve = curve_of(series_circuit(50, 10), 865e6, 1500e6, 101);
    EXPECT_FALSE(band_match(curve, 863e6, 870e6));
}

}  // namespace
}  // namespace annulet
