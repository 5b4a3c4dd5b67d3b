#include <gmock/gmock.h>
#include <gtest/gtest.h>
#include <annulet/io/check_result.hpp>
#include <annulet/io/layout_svg.hpp>
#include <annulet/model/drawing.hpp>

namespace annulet {
namespace {

const std::string board = R"(
title = "Ring & <board>"
unit = "mm"
[[laminate]]
name = "board"
top = 0
thickness = 1.6
permittivity = 4.3
outline = { rectangle = { center = [0, 0], size = [100, 70] } }
openings = [ { rectangle = { center = [0, 0], size = [20, 10] } } ]
[[metal]]
name = "loop"
on = "board.top"
ring = { center = [0, 0], radius = 28, width = 6 }
[[metal]]
name = "slot"
on = "board.top"
cut = true
rectangle = { center = [0, 28], size = [0.5, 10] }
[[metal]]
name = "island"
on = "board.bottom"
rectangle = { center = [-40, -25], size = [12, 8] }
[[port]]
name = "feed"
on = "board.top"
across = [[25, 0], [31, 0]]
gap = 1.5
[[lumped]]
name = "trim"
on = "board.top"
bridge = [[-0.25, 28], [0.25, 28]]
width = 1
capacitance = "1 pF"
[fabrication]
minimum_slot = "0.8 mm"
minimum_web = "1 mm"
tool_radius = "1 mm"
[sweep]
from = "500 MHz"
to = "1500 MHz"
points = 3
)";

CheckReport report_of(const Model& model) {
    const MeshOptions options = check_mesh_options(model);
    return check_model(model, make_mesh(model, options), options.top_frequency_hz);
}

TEST(Check, FindsSlotCornersAndFloatingMetal) {
    const Model model = evaluate(read_drawing(board, "board.toml"));
    const CheckReport report = report_of(model);
    ASSERT_EQ(report.findings.size(), 5u);
    EXPECT_EQ(report.findings[0].rule.kind, RuleFinding::Kind::slot);
    EXPECT_NEAR(report.findings[0].rule.measured_m, 0.5e-3, 0.02e-3);
    EXPECT_EQ(report.findings[0].layer, "metal at 0 mm");
    for (std::size_t k = 1; k < 5; ++k) EXPECT_EQ(report.findings[k].rule.kind, RuleFinding::Kind::inner_corner);
    ASSERT_EQ(report.electrical.size(), 1u);
    EXPECT_THAT(report.electrical[0], testing::HasSubstr("is joined to no port"));
    EXPECT_FALSE(report.passed());
    EXPECT_GE(report.cells_per_wavelength, 15.0);
    const std::string text = check_text(model, report);
    EXPECT_THAT(text, testing::HasSubstr("slot of 0.5 mm at ("));
    EXPECT_THAT(text, testing::HasSubstr("5 places break the fabrication rules"));
}

TEST(Check, DrawingNamesAndMarksEverything) {
    const Model model = evaluate(read_drawing(board, "board.toml"));
    const CheckReport report = report_of(model);
    const std::string svg = layout_svg(model, report.findings, nullptr);
    for (const char* text : {"P1 feed", "L1 trim", "laminate 'board', 1.6 mm, top at 0 mm", "metal at 0 mm: loop",
                             "metal at -1.6 mm: island", "!5", "20 mm, drawn 2 : 1", "Ring &amp; &lt;board&gt;"})
        EXPECT_THAT(svg, testing::HasSubstr(text));
    EXPECT_THAT(svg, testing::Not(testing::HasSubstr("stroke-width=\"0.1\"")));
    const Mesh mesh = make_mesh(model, check_mesh_options(model));
    EXPECT_THAT(layout_svg(model, report.findings, &mesh), testing::HasSubstr("stroke-width=\"0.1\""));
}

}  // namespace
}  // namespace annulet
