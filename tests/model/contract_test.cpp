// The example of the file format, whole, becomes the numbers written in it.
#include <annulet/core/constants.hpp>
#include <annulet/model/drawing.hpp>

#include <gtest/gtest.h>

namespace annulet {
namespace {

const char* const example = R"(title = "River-gauge receive loop, 868.3 MHz"
unit  = "mm"

[parameters]
radius = 54.9
width  = 8.0
gap    = 1.2

[[laminate]]
name = "board"
top  = "0 mm"
thickness = "1.6 mm"
permittivity = 4.3
loss_tangent = 0.015
outline  = { ring = { center = [0, 0], radius = "radius", width = "width + 6 mm" } }
openings = [ { rectangle = { center = ["radius", 0], size = ["width", "gap"] } } ]

[[metal]]
name = "band"
on   = "board.top"
ring = { center = [0, 0], radius = "radius", width = "width" }
material  = "copper"
thickness = "35 um"

[[metal]]
name = "feed gap"
on   = "board.top"
cut  = true
rectangle = { center = ["radius", 0], size = ["2*width", "gap"] }

[[via]]
name = "stitch"
at   = ["-radius", 0]
diameter = "0.6 mm"
from = "board.top"
to   = "board.bottom"

[[wire]]
name   = "feed lead"
radius = "0.5 mm"
path   = [[0, 0, 0], [0, 0, 20], { arc = { center = [0, 10, 20], normal = [1, 0, 0], sweep = "90 deg" } }]

[[port]]
name   = "feed"
on     = "board.top"
bridge = [["radius", "-gap/2"], ["radius", "gap/2"]]
width  = "1.2 mm"
reference_impedance = "50 ohm"
line   = { impedance = "50 ohm", length = "12 mm", velocity_factor = 0.66 }

[[port]]
name = "lead"
wire = "feed lead"
at = 0.25
gap = "2 mm"

[[lumped]]
name   = "trim"
bridge = [["-radius", "-gap/2"], ["-radius", "gap/2", "-1.6 mm"]]
width  = "1 mm"
capacitance = "0.4 pF"
quality = 200
quality_at = "1 GHz"
self_resonance = "6 GHz"

[ground]
plane = "-40 mm"

[goal]
band = ["863 MHz", "870 MHz"]
vswr = 2.0
reject = [ { name = "UHF broadcast", band = ["470 MHz", "694 MHz"] }, { name = "ISM 2.4 GHz", band = ["2.4 GHz", "2.4835 GHz"] } ]

[transmit]
power = "25 mW"
duty  = "1 %"

[[feature]]
name = "series capacitor"
off  = { set = { gap = 1.0 }, omit = ["trim"] }

[sweep]
from = "100 MHz"
to   = "3 GHz"
points = 1001

[fabrication]
minimum_slot = "0.8 mm"
minimum_web  = "2 mm"
tolerance = { etch = "0.05 mm", rout = "0.1 mm", thickness = "10 %", permittivity = "5 %" }

[accuracy]
resonance = "0.1 %"
laminate  = "static"
layers = 3
)";

constexpr double close = 1e-15;

Model example_model() {
    try {
        return evaluate(read_drawing(example, "example.toml"));
    } catch (const InputError& error) {
        for (const auto& fault : error.faults()) ADD_FAILURE() << format(fault, "example.toml", example);
        throw;
    }
}

TEST(Contract, LaminateAndMetal) {
    const Model model = example_model();
    EXPECT_EQ(model.title, "River-gauge receive loop, 868.3 MHz");
    EXPECT_EQ(model.file, "example.toml");
    ASSERT_EQ(model.laminates.size(), 1U);
    const Laminate& board = model.laminates[0];
    EXPECT_NEAR(board.bottom_m(), -1.6e-3, close);
    ASSERT_EQ(board.permittivity.size(), 1U);
    EXPECT_EQ(board.permittivity[0].permittivity, 4.3);
    EXPECT_EQ(board.permittivity[0].frequency_hz, 1e9);
    EXPECT_EQ(board.loss_tangent, 0.015);
    const Ring outline = std::get<Ring>(std::get<Shape>(board.outline));
    EXPECT_NEAR(outline.width_m, 14e-3, close);
    EXPECT_NEAR(std::get<Rectangle>(board.openings.at(0)).size.y(), 1.2e-3, close);
    ASSERT_EQ(model.metals.size(), 2U);
    EXPECT_NEAR(std::get<Ring>(model.metals[0].shape).radius_m, 54.9e-3, close);
    EXPECT_NEAR(model.metals[0].conductor.thickness_m, 35e-6, close);
    EXPECT_EQ(model.metals[0].conductor.conductivity_s_per_m, 5.8e7);
    EXPECT_TRUE(model.metals[1].cut);
    EXPECT_NEAR(std::get<Rectangle>(model.metals[1].shape).size.x(), 16e-3, close);
    EXPECT_EQ(model.metals[1].where, (Position{25, 1}));
}

TEST(Contract, ViaAndWire) {
    const Model model = example_model();
    EXPECT_NEAR(model.vias.at(0).at.x(), -54.9e-3, close);
    EXPECT_NEAR(model.vias.at(0).to_m, -1.6e-3, close);
    const WirePath path = std::get<WirePath>(model.wires.at(0).shape);
    ASSERT_EQ(path.pieces.size(), 3U);
    EXPECT_NEAR(std::get<WireArc>(path.pieces[2]).sweep_rad, constants::pi / 2, close);
    EXPECT_EQ(model.wires[0].radius_m, 0.5e-3);
}

TEST(Contract, PortsAndParts) {
    const Model model = example_model();
    ASSERT_EQ(model.ports.size(), 2U);
    const Bridge feed = std::get<Bridge>(model.ports[0].placement);
    EXPECT_NEAR(feed.from.y(), -0.6e-3, close);
    EXPECT_NEAR(feed.to.y(), 0.6e-3, close);
    EXPECT_EQ(feed.from.z(), 0);
    EXPECT_EQ(model.ports[0].where, (Position{46, 10}));
    EXPECT_EQ(model.ports[0].line->velocity_factor, 0.66);
    const OnWire lead = std::get<OnWire>(model.ports[1].placement);
    EXPECT_EQ(lead.wire, "feed lead");
    EXPECT_EQ(lead.at, 0.25);
    const Lumped& trim = model.lumped.at(0);
    EXPECT_NEAR(*trim.capacitance_f, 0.4e-12, 1e-25);
    EXPECT_EQ(*trim.quality, 200);
    EXPECT_EQ(trim.quality_at_hz, 1e9);
    EXPECT_EQ(std::get<Bridge>(trim.placement).from.z(), 0);
    EXPECT_NEAR(std::get<Bridge>(trim.placement).to.z(), -1.6e-3, close);
}

TEST(Contract, Settings) {
    const Model model = example_model();
    EXPECT_NEAR(*model.ground_plane_m, -40e-3, close);
    EXPECT_EQ(model.goal.band->from_hz, 863e6);
    ASSERT_EQ(model.goal.reject.size(), 2U);
    EXPECT_EQ(model.goal.reject[1].name, "ISM 2.4 GHz");
    EXPECT_NEAR(model.transmit->power_w, 25e-3, close);
    EXPECT_NEAR(model.transmit->duty, 0.01, close);
    EXPECT_EQ(model.sweep.points, 1001);
    EXPECT_EQ(model.sweep.to_hz, 3e9);
    EXPECT_NEAR(*model.fabrication.minimum_slot_m, 0.8e-3, close);
    EXPECT_NEAR(*model.fabrication.permittivity_fraction, 0.05, close);
    EXPECT_NEAR(*model.accuracy.resonance_fraction, 1e-3, close);
    EXPECT_EQ(model.accuracy.laminate, LaminateMethod::fixed_static);
    EXPECT_EQ(model.accuracy.layers, 3);
    EXPECT_EQ(model.parameters_si.at("radius"), 54.9);
}

TEST(Contract, FeatureCanBeSwitchedOff) {
    const Drawing drawing = read_drawing(example, "example.toml");
    const Feature feature = evaluate(drawing).features.at(0);
    EXPECT_EQ(feature.set.at("gap"), "1");
    const Model without = evaluate(drawing, feature.set, feature.omit);
    EXPECT_TRUE(without.lumped.empty());
    EXPECT_NEAR(std::get<Bridge>(without.ports.at(0).placement).to.y(), 0.5e-3, close);
}

}  // namespace
}  // namespace annulet
