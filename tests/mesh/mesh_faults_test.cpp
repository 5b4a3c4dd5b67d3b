#include "mesh_support.hpp"

namespace annulet::test {
namespace {

Model with_bridge(const Bridge& drawn) {
    Model model = gauge_ring(1.2 * mm);
    model.ports[0].placement = drawn;
    return model;
}

Model with_across(const Across& drawn) {
    Model model;
    model.metals = {metal("line", box(0, 0, 100 * mm, 4 * mm))};
    model.ports = {port("feed", drawn)};
    return model;
}

Model of(std::vector<Metal> metals) {
    Model model;
    model.metals = std::move(metals);
    return model;
}

TEST(MeshFaults, BridgeThatMissesTheMetal) {
    EXPECT_EQ(fault_text(with_bridge(bridge({62 * mm, -0.6 * mm}, {62 * mm, 0.6 * mm}, 1 * mm))),
              "3: port 'feed' touches no metal: its bridge starts at (62, -0.6) mm, 3.103 mm from the nearest edge\n");
    EXPECT_EQ(fault_text(with_bridge(bridge({54.9 * mm, -0.6 * mm}, {54.9 * mm, 0}, 1 * mm))),
              "3: port 'feed' touches no metal: its bridge ends at (54.9, 0) mm, 0.6 mm from the nearest edge\n");
    Model above = gauge_ring(1.2 * mm);
    above.ports[0].placement = Bridge{{54.9 * mm, -0.6 * mm, 1.6 * mm}, {54.9 * mm, 0.6 * mm, 1.6 * mm}, 1 * mm};
    EXPECT_EQ(fault_text(above), "3: port 'feed' touches no metal: there is none on its plane at height 1.6 mm\n");
}

TEST(MeshFaults, BridgeOnUnbrokenMetal) {
    EXPECT_EQ(fault_text(with_bridge(bridge({-54.9 * mm, -0.6 * mm}, {-54.9 * mm, 0.6 * mm}, 1 * mm))),
              "3: port 'feed' lies on unbroken metal: its bridge is shorted\n");
}

TEST(MeshFaults, BridgeWiderThanTheMetal) {
    EXPECT_EQ(fault_text(with_bridge(bridge({54.9 * mm, -0.6 * mm}, {54.9 * mm, 0.6 * mm}, 10 * mm))),
              "3: port 'feed' is wider than the metal: its bridge of 10 mm reaches 1.003 mm beyond the edge of metal "
              "'band'\n");
}

TEST(MeshFaults, BridgesWithoutSense) {
    EXPECT_EQ(fault_text(with_bridge(bridge({54.9 * mm, 0.6 * mm}, {54.9 * mm, 0.6 * mm}, 1 * mm))),
              "3: port 'feed' has no length: both ends of its bridge are at (54.9, 0.6) mm\n");
    EXPECT_EQ(fault_text(with_bridge(bridge({54.9 * mm, -0.6 * mm}, {54.9 * mm, 0.6 * mm}, 0))),
              "3: port 'feed' has a bridge of width 0 mm, which is not positive\n");
    EXPECT_EQ(fault_text(with_bridge(bridge({54.9 * mm, NAN}, {54.9 * mm, 0.6 * mm}, 1 * mm))),
              "3: port 'feed' has a bridge with a number that is not finite\n");
    EXPECT_EQ(fault_text(with_bridge(Bridge{{54.9 * mm, -0.6 * mm, 0}, {54.9 * mm, 0.6 * mm, 1 * mm}, 1 * mm})),
              "3: port 'feed' bridges two planes, which is not yet meshed\n");
    EXPECT_EQ(fault_text(with_bridge(bridge({-54.9 * mm, 0}, {54.9 * mm, 0.7 * mm}, 1 * mm))),
              "3: port 'feed' has both ends of its bridge on the same edge of the metal\n");
}

TEST(MeshFaults, BridgeBackToItsOwnEdge) {
    // A cut with a bulge: the end of the strip is bent, and the bridge leaves it and comes back.
    Model model = of({metal("line", box(0, 0, 100 * mm, 20 * mm)), cut("bite", Disc{{50 * mm, 0}, 10.2 * mm})});
    model.ports = {port("feed", bridge({46 * mm, -9.9 * mm}, {46 * mm, 9.9 * mm}, 1 * mm))};
    EXPECT_EQ(fault_text(model), "3: port 'feed' has both ends of its bridge on the same edge of the metal\n");
}

TEST(MeshFaults, BridgeToAnOpenEnd) {
    Model model = of({metal("line", box(0, 0, 100 * mm, 4 * mm))});
    model.ports = {port("feed", bridge({45 * mm, 0}, {50 * mm, 0}, 1 * mm))};
    EXPECT_EQ(fault_text(model),
              "3: port 'feed' ends on an edge with no metal beyond, at (50, 0) mm: its bridge crosses no gap there\n");
}

TEST(MeshFaults, BridgeOverTwoGaps) {
    Model model = of({metal("line", box(0, 0, 100 * mm, 4 * mm)), cut("one", box(-5 * mm, 0, 1 * mm, 8 * mm)),
                      cut("two", box(5 * mm, 0, 1 * mm, 8 * mm))});
    model.ports = {port("feed", bridge({-10 * mm, 0}, {10 * mm, 0}, 1 * mm))};
    EXPECT_EQ(fault_text(model), "3: port 'feed' spans more than one gap of the metal\n");
}

TEST(MeshFaults, GapsThatTouchOrOverlap) {
    Model model = gauge_ring(1.2 * mm);
    model.lumped = {part("trim", bridge({55.9 * mm, -0.6 * mm}, {55.9 * mm, 0.6 * mm}, 1 * mm))};
    EXPECT_EQ(fault_text(model), "4: part 'trim' touches or overlaps port 'feed'\n");
    model.lumped = {part("trim", bridge({56 * mm, -0.6 * mm}, {56 * mm, 0.6 * mm}, 1 * mm))};
    EXPECT_EQ(fault_text(model), "4: part 'trim' touches or overlaps port 'feed'\n");
    model = with_across(across({0, -2 * mm}, {0, 2 * mm}, 1 * mm));
    model.lumped = {part("trim", across({1 * mm, -2 * mm}, {1 * mm, 2 * mm}, 1 * mm))};
    EXPECT_EQ(fault_text(model), "4: part 'trim' touches or overlaps port 'feed'\n");
    model.lumped = {part("trim", across({0.1 * mm, -2 * mm}, {0.1 * mm, 2 * mm}, 0.2 * mm))};
    EXPECT_EQ(fault_text(model), "4: part 'trim' touches or overlaps port 'feed'\n");
    model.lumped = {part("trim", across({0, -2 * mm}, {0, 2 * mm}, 3 * mm))};
    EXPECT_EQ(fault_text(model), "4: part 'trim' touches or overlaps port 'feed'\n");
    model.lumped = {part("trim", across({0.5 * mm, -2 * mm}, {0.5 * mm, 2 * mm}, 1 * mm))};
    EXPECT_EQ(fault_text(model), "4: part 'trim' touches or overlaps port 'feed'\n");
}

TEST(MeshFaults, SlitsWithoutSense) {
    EXPECT_EQ(fault_text(with_across(across({0, 0}, {0, 2 * mm}, 1 * mm))),
              "3: port 'feed' does not cross metal 'line' from edge to edge: its line has an end at (0, 0) mm, 2 mm "
              "inside\n");
    EXPECT_EQ(fault_text(with_across(across({0, 5 * mm}, {0, 9 * mm}, 1 * mm))),
              "3: port 'feed' touches no metal: its line starts at (0, 5) mm, 3 mm from the nearest edge\n");
    EXPECT_EQ(fault_text(with_across(across({0, -2 * mm}, {0, 2 * mm}, 0))),
              "3: port 'feed' has a gap of 0 mm: a source of no length has no finite reactance\n");
    EXPECT_EQ(fault_text(with_across(across({0, -2 * mm}, {0, 2 * mm}, 120 * mm))),
              "3: port 'feed' does not fit: its gap of 120 mm reaches the end of metal 'line'\n");
    EXPECT_EQ(fault_text(with_across(across({0, 1 * mm}, {0, 1 * mm}, 1 * mm))),
              "3: port 'feed' has no width: both ends of its line are at (0, 1) mm\n");
    Model loop = of({metal("band", ring(54 * mm, 8 * mm))});
    loop.ports = {port("feed", across({50 * mm, 0}, {58 * mm, 0}, 3 * mm))};
    loop.lumped = {part("trim", across({50 * mm, 0.1 * mm}, {58 * mm, 0.1 * mm}, 1 * mm))};
    EXPECT_EQ(fault_text(loop), "4: part 'trim' touches or overlaps port 'feed'\n");
    Model rails = of({metal("a", box(0, 0, 100 * mm, 4 * mm)), metal("b", box(0, 8 * mm, 100 * mm, 4 * mm))});
    rails.ports = {port("feed", across({0, -2 * mm}, {0, 10 * mm}, 1 * mm))};
    EXPECT_EQ(fault_text(rails), "3: port 'feed' crosses more than one piece of metal\n");
}

TEST(MeshFaults, CutsThatLeaveNothing) {
    const Metal line = metal("line", box(0, 0, 100 * mm, 4 * mm));
    EXPECT_EQ(fault_text(of({line, cut("all", box(0, 0, 200 * mm, 20 * mm))})), "1: there is no metal to mesh\n");
    EXPECT_EQ(fault_text(of({metal("pad", Disc{{0, 0}, 5 * mm}), cut("all", box(0, 0, 200 * mm, 20 * mm))})),
              "1: there is no metal to mesh\n");
    EXPECT_EQ(fault_text(of({line, cut("elsewhere", box(0, 20 * mm, 20 * mm, 20 * mm))})), "no fault");
}

TEST(MeshFaults, PortsOnPlates) {
    Model model = of({metal("left", Disc{{-11 * mm, 0}, 10 * mm}), metal("right", Disc{{11 * mm, 0}, 10 * mm})});
    const auto with = [&](const Placement& placement) {
        model.ports = {port("feed", placement)};
        return fault_text(model);
    };
    EXPECT_EQ(with(bridge({-1 * mm, 0}, {1 * mm, 0}, 1 * mm)), "no fault");
    EXPECT_EQ(with(bridge({-1 * mm, 0}, {0.5 * mm, 0}, 1 * mm)),
              "3: port 'feed' touches no metal: its bridge ends at (0.5, 0) mm, 0.5 mm from the nearest edge\n");
    EXPECT_EQ(with(bridge({-12 * mm, 0}, {-10 * mm, 0}, 1 * mm)),
              "3: port 'feed' lies on unbroken metal: its bridge is shorted\n");
    EXPECT_EQ(with(bridge({-1 * mm, 0}, {1 * mm, 0}, 15 * mm)),
              "3: port 'feed' starts on an edge that its bridge of 15 mm overhangs, at (-1, 0) mm\n");
    EXPECT_EQ(with(across({-11 * mm, -10 * mm}, {-11 * mm, 10 * mm}, 1 * mm)), "no fault");
    EXPECT_EQ(with(across({-11 * mm, -10 * mm}, {-11 * mm, 5 * mm}, 1 * mm)),
              "3: port 'feed' does not cross the metal from edge to edge: its line has an end at (-11, 5) mm, 5 mm "
              "inside\n");
}

TEST(MeshFaults, StripsThatCurlOverThemselves) {
    EXPECT_EQ(fault_text(of({metal(
                  "knot",
                  path({0, 0}, {{40 * mm, 0}, {40 * mm, 20 * mm}, {20 * mm, 20 * mm}, {20 * mm, -20 * mm}}, 2 * mm))})),
              "1: metal 'knot' curls over itself\n");
    EXPECT_EQ(fault_text(of({metal("hook", path({0, 0}, {{40 * mm, 0}, {0, 1 * mm}}, 2 * mm))})),
              "1: metal 'hook' folds back on itself at (40, 0) mm\n");
    EXPECT_EQ(
        fault_text(of({metal("zed", path({0, 0}, {{40 * mm, 0}, {40 * mm, 3 * mm}, {10 * mm, 3 * mm}}, 8 * mm))})),
        "1: metal 'zed' curls over itself: piece 2 of its path, 3 mm long, is too short for its width\n");
    StripPath tight = path({0, 0}, {}, 8 * mm);
    tight.pieces.push_back({true, {0, 6 * mm}, {0, 3 * mm}, pi});
    EXPECT_EQ(
        fault_text(of({metal("tight", tight)})),
        "1: metal 'tight' curls over itself: the radius of 3 mm of piece 1 is not above half its width of 8 mm\n");
}

TEST(MeshFaults, ShapesWithoutSense) {
    EXPECT_EQ(fault_text(of({metal("r", ring(0, 1 * mm))})),
              "1: metal 'r' has a radius of 0 mm, which is not positive\n");
    EXPECT_EQ(fault_text(of({metal("r", ring(4 * mm, 9 * mm))})),
              "1: metal 'r' has no opening: its width of 9 mm is not below twice its radius of 4 mm\n");
    EXPECT_EQ(fault_text(of({metal("p", path({0, 0}, {{0, 0}}, 1 * mm))})),
              "1: metal 'p' has no length in piece 1 of its path\n");
    EXPECT_EQ(fault_text(of({metal("p", path({0, 0}, {}, 1 * mm))})), "1: metal 'p' has an empty path\n");
    EXPECT_EQ(fault_text(of({metal("p", path({0, 0}, {{NAN, 0}}, 1 * mm))})),
              "1: metal 'p' has a number that is not finite in piece 1 of its path\n");
    EXPECT_EQ(fault_text(of({metal("p", path({0, 0}, {{40 * mm, 0}}, 1 * mm, true))})),
              "1: metal 'p' is closed but does not end where it starts\n");
    EXPECT_EQ(fault_text(of({metal("b", box(0, 0, 0, 1 * mm))})),
              "1: metal 'b' has a size of 0 mm by 1 mm, which is not positive\n");
}

TEST(MeshFaults, AllFaultsInOneGoInOrder) {
    Model model = gauge_ring(1.2 * mm);
    model.ports[0].where = {9, 1};
    model.ports[0].placement = bridge({70 * mm, 0}, {71 * mm, 0}, 1 * mm);
    model.lumped = {part("trim", bridge({-54.9 * mm, -0.6 * mm}, {-54.9 * mm, 0.6 * mm}, 1 * mm), 7)};
    model.ports.push_back(port("lead", OnWire{"mast", 0.5, 1 * mm}, 8));
    EXPECT_EQ(fault_text(model),
              "7: part 'trim' lies on unbroken metal: its bridge is shorted\n"
              "8: port 'lead' is on wire 'mast', which does not exist\n"
              "9: port 'feed' touches no metal: its bridge starts at (70, 0) mm, 11.12 mm from the nearest edge\n");
}

TEST(MeshFaults, CutOrSlitOverACorner) {
    Model model = of({metal("ell", path({-50 * mm, 0}, {{0, 0}, {0, 50 * mm}}, 4 * mm))});
    model.ports = {port("feed", across({-2 * mm, 2 * mm}, {2 * mm, -2 * mm}, 1 * mm))};
    EXPECT_EQ(fault_text(model),
              "1: metal 'ell' is cut or slit across its corner at (0, 0) mm, which is not yet meshed\n");
}

TEST(MeshFaults, ViasAreNotSilentlyDropped) {
    Model model = of({metal("line", box(0, 0, 100 * mm, 4 * mm))});
    model.vias = {Via{"stitch", {0, 0}, 1 * mm, 0, 1 * mm, {6, 1}}};
    EXPECT_EQ(fault_text(model), "6: via 'stitch' is not yet meshed\n");
}

}  // namespace
}  // namespace annulet::test
