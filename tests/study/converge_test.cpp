#include <annulet/study/converge.hpp>

#include <gtest/gtest.h>
#include <annulet/model/drawing.hpp>

#include <algorithm>
#include <cmath>
#include <string>

namespace annulet {
namespace {

// Errors c h^p at h, h/r, h/r^2: the half-width must cover the error left on the finest mesh.
TEST(Converge, IndexCoversKnownErrors) {
    const double r = 1.5;
    for (const double p : {1.0, 1.5, 2.0, 3.0}) {
        const auto error = [&](int mesh) { return std::pow(r, -p * mesh); };
        const double first = error(1) - error(0), last = error(2) - error(1);
        const double half_width = three_mesh_uncertainty(first, r, last, r);
        EXPECT_GE(half_width, error(2)) << p;
        EXPECT_LE(half_width, 5 * error(2) * std::pow(r, p - 1)) << p;
    }
    for (const double p : {1.0, 2.0}) EXPECT_GE(two_mesh_uncertainty(std::pow(r, -p) - 1, r), std::pow(r, -p)) << p;
    EXPECT_DOUBLE_EQ(three_mesh_uncertainty(-1, r, 1, r), two_mesh_uncertainty(1, r));
}

Model ring(const std::string& more) {
    const std::string text =
        "unit = \"mm\"\n[[metal]]\nname = \"band\"\nplane = \"0 mm\"\n"
        "ring = { center = [0, 0], radius = 54, width = 8 }\n"
        "[[port]]\nname = \"feed\"\nacross = [[50, 0], [58, 0]]\ngap = 5.65\n"
        "[sweep]\nfrom = \"900 MHz\"\nto = \"1100 MHz\"\npoints = 21\n";
    return evaluate(read_drawing(text + more, "ring"), {});
}

// Thin-loop theory for the same ring and gap: 1000.5 MHz (series of [Storer1956, Wu1962], evaluated before this
// project; the equivalent radius w/4 of a strip is itself good to about 0.1 %).
TEST(Converge, ErrorBarOfARing) {
    const auto solved = solve_with_error_bars(ring(""), {});
    const auto& all = solved.resonances;
    const auto series = std::find_if(all.begin(), all.end(), [](auto& r) { return r.kind == ResonanceKind::series; });
    ASSERT_NE(series, all.end());
    EXPECT_GT(series->uncertainty_hz, 0);
    EXPECT_LT(series->uncertainty_hz, 5e-3 * series->frequency_hz);
    EXPECT_LT(std::abs(series->frequency_hz - 1000.5e6), series->uncertainty_hz + 1e-3 * 1000.5e6);
    EXPECT_GT(series->q_mode, 0);
    ASSERT_EQ(solved.reflection_uncertainty.size(), 1u);
    EXPECT_EQ(solved.reflection_uncertainty[0].size(), solved.frequency_hz.size());
    EXPECT_GT(solved.reflection_error, 0);
    EXPECT_LT(solved.reflection_error, 3e-6);
}

TEST(Converge, SaysWhenTheBoundIsOutOfReach) {
    ConvergeOptions converge;
    converge.most_meshes = 2;
    const auto solved = solve_with_error_bars(ring("[accuracy]\nresonance = \"0.0001 %\"\n"), {}, converge);
    const auto said = std::any_of(solved.cautions.begin(), solved.cautions.end(),
                                  [](auto& text) { return text.starts_with("[accuracy] asks for resonances within"); });
    EXPECT_TRUE(said);
}

// The default sweep and the exact one are the same within the stated error, at every frequency.
TEST(SolveModel, EveryPointIsTheTruth) {
    SolveOptions options;
    const auto reduced = solve_model(ring(""), options);
    options.every_point = true;
    const auto exact = solve_model(ring(""), options);
    ASSERT_EQ(reduced.frequency_hz, exact.frequency_hz);
    EXPECT_EQ(exact.reflection_error, 0);
    EXPECT_EQ(exact.full_solves, 21);
    EXPECT_LT(reduced.full_solves, 11);
    for (std::size_t i = 0; i < exact.network.size(); ++i)
        EXPECT_LT(std::abs(reduced.network[i].scattering(0, 0) - exact.network[i].scattering(0, 0)),
                  reduced.reflection_error);
    for (const PowerBalance& balance : reduced.balances) EXPECT_NEAR(balance.ratio(), 1, 1e-4);
}

}  // namespace
}  // namespace annulet
