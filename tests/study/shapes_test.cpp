// One figure drawn in different ways, and refinement of a slotted and tapped one.
#include <gtest/gtest.h>
#include <annulet/model/drawing.hpp>
#include <annulet/study/solve.hpp>

#include <fmt/format.h>

#include <cmath>

namespace annulet {
namespace {

const std::string port_and_sweep = R"(
[[port]]
name = "feed"
across = [[50, 0], [58, 0]]
gap = 5.65
[sweep]
from = "960 MHz"
to = "1040 MHz"
points = 5
)";

double series_resonance_hz(const std::string& metal) {
    const std::string text = "title = \"ring\"\nunit = \"mm\"\n" + metal + port_and_sweep;
    SolveOptions options;
    options.threads = 1;
    const SolvedModel solved = solve_model(evaluate(read_drawing(text, "ring.toml")), options);
    for (const auto& found : solved.resonances)
        if (found.kind == ResonanceKind::series) return found.frequency_hz;
    return 0;
}

// Corners on a circle that is larger so that the polygon keeps the area.
std::string polygon(double radius, int corners) {
    const double step = 2 * M_PI / corners, grown = radius * std::sqrt(step / std::sin(step));
    std::string text = "polygon = [";
    for (int i = 0; i < corners; ++i)
        text += fmt::format("{}[{:.6f}, {:.6f}]", i == 0 ? "" : ", ", grown * std::cos(step * (i + 0.5)),
                            grown * std::sin(step * (i + 0.5)));
    return text + "]\n";
}

std::string outer_minus_inner(const std::string& outer, const std::string& inner) {
    return "[[metal]]\nname = \"band\"\nplane = \"0 mm\"\n" + outer +
           "[[metal]]\nname = \"hole\"\nplane = \"0 mm\"\ncut = true\n" + inner;
}

TEST(Shapes, RingPolygonAndDiscMinusDiscAreOneRing) {
    const double ring = series_resonance_hz(
        "[[metal]]\nname = \"band\"\nplane = \"0 mm\"\nring = { center = [0, 0], radius = 54, width = 8 }\n");
    // Series of thin-loop theory for this ring and gap, 1000.5 MHz [Storer1956]; see models/expected.toml.
    EXPECT_NEAR(ring, 1000.5e6, 0.003 * 1000.5e6);
    const double polygons = series_resonance_hz(outer_minus_inner(polygon(58, 180), polygon(50, 180)));
    const double discs = series_resonance_hz(
        outer_minus_inner("disc = { center = [0, 0], radius = 58 }\n", "disc = { center = [0, 0], radius = 50 }\n"));
    EXPECT_NEAR(polygons / ring, 1.0, 1e-3);
    EXPECT_NEAR(discs / ring, 1.0, 1e-3);
}

}  // namespace
}  // namespace annulet
