#include <random>

#include "mesh_support.hpp"

namespace annulet::test {
namespace {

// Impressed field summed over the gap cells: area / length in the direction of the current, width for a rectangle.
Vec3 field_sum(const Mesh& mesh, const Gap& gap) {
    Vec3 sum(0, 0, 0);
    for (const Gap::Member& member : gap.members)
        sum += cell_area_m2(mesh, mesh.cells[static_cast<std::size_t>(member.cell)]) * member.field_per_m;
    return sum;
}

Model dipole(double bridge_width) {
    Model model;
    model.metals = {metal("arms", box(0, 0, 160 * mm, 8 * mm)), cut("gap", box(0, 0, 3 * mm, 20 * mm))};
    model.ports = {port("feed", bridge({-1.5 * mm, 0}, {1.5 * mm, 0}, bridge_width))};
    return model;
}

TEST(Gap, BridgeOfTheWidthOfTheBandUsesItsLines) {
    const Mesh mesh = make_mesh(dipole(8 * mm), {});
    expect_sound(mesh);
    EXPECT_EQ(mesh.ports[0].members.size(), 2u * 3u);
    EXPECT_NEAR(mesh.ports[0].length_m, 3 * mm, 1e-15);
    EXPECT_NEAR(gap_area(mesh, mesh.ports[0]), 24 * mm * mm, 1e-18);
    EXPECT_NEAR((field_sum(mesh, mesh.ports[0]) - Vec3(8 * mm, 0, 0)).norm(), 0, 1e-15);
    EXPECT_NEAR(total_area(mesh), 160 * 8 * mm * mm, 1e-16);
}

TEST(Gap, NarrowBridgeIsConformingAndKeepsItsWidth) {
    for (const double width : {0.3 * mm, 1.2 * mm, 4 * mm, 7.5 * mm}) {
        const Mesh mesh = make_mesh(dipole(width), {});
        expect_sound(mesh);
        EXPECT_NEAR(gap_area(mesh, mesh.ports[0]), 3 * mm * width, 1e-17);
        EXPECT_NEAR((field_sum(mesh, mesh.ports[0]) - Vec3(width, 0, 0)).norm(), 0, 1e-15);
        expect_mirrored(
            mesh, [](const Vec3& p) { return Vec3(-p.x(), p.y(), 0); }, 1e-15);
        expect_mirrored(
            mesh, [](const Vec3& p) { return Vec3(p.x(), -p.y(), 0); }, 1e-15);
    }
}

TEST(Gap, BridgeEndsInsideTheMetalSpanTheRealGapOnly) {
    Model model = dipole(2 * mm);
    model.ports[0].placement = bridge({-4 * mm, 0}, {3 * mm, 0}, 2 * mm);
    const Mesh mesh = make_mesh(model, {});
    expect_sound(mesh);
    EXPECT_NEAR(mesh.ports[0].length_m, 3 * mm, 1e-15);
    EXPECT_NEAR(gap_area(mesh, mesh.ports[0]), 6 * mm * mm, 1e-17);
}

TEST(Gap, ReversedBridgeReversesTheField) {
    Model model = dipole(2 * mm);
    model.ports[0].placement = bridge({1.5 * mm, 0}, {-1.5 * mm, 0}, 2 * mm);
    const Mesh mesh = make_mesh(model, {});
    expect_sound(mesh);
    EXPECT_NEAR((field_sum(mesh, mesh.ports[0]) - Vec3(-2 * mm, 0, 0)).norm(), 0, 1e-15);
}

TEST(Gap, SeveralGapsOnOneRing) {
    Model model = gauge_ring(1.2 * mm);
    model.metals.push_back(cut("trim gap", box(-54.9 * mm, 0, 16 * mm, 1.2 * mm), 5));
    model.lumped = {part("trim", bridge({-54.9 * mm, -0.6 * mm}, {-54.9 * mm, 0.6 * mm}, 1 * mm))};
    model.ports.push_back(port("second", across({0, 50.9 * mm}, {0, 58.9 * mm}, 1 * mm), 6));
    model.lumped.push_back(part("low", across({0, -50.9 * mm}, {0, -58.9 * mm}, 1 * mm), 7));
    const Mesh mesh = make_mesh(model, {});
    expect_sound(mesh);
    ASSERT_EQ(mesh.ports.size(), 2u);
    ASSERT_EQ(mesh.lumped.size(), 2u);
    EXPECT_EQ(mesh.ports[1].name, "second");
    EXPECT_EQ(mesh.lumped[1].name, "low");
    EXPECT_NEAR(gap_area(mesh, mesh.ports[0]), 1.2 * 1.2 * mm * mm, 1e-10);
    EXPECT_NEAR(gap_area(mesh, mesh.lumped[0]), 1.2 * 1 * mm * mm, 1e-10);
    expect_mirrored(
        mesh, [](const Vec3& p) { return Vec3(p.x(), -p.y(), 0); }, 2e-15);
}

TEST(Gap, SlitSidesFollowTheDrawnLine) {
    Model model;
    model.metals = {metal("band", ring(54 * mm, 8 * mm))};
    model.ports = {port("feed", across({50 * mm, 0}, {58 * mm, 0}, 5.65 * mm))};
    const Mesh mesh = make_mesh(model, {});
    expect_sound(mesh);
    const Gap& gap = mesh.ports[0];
    EXPECT_EQ(gap.length_m, 5.65 * mm);
    double lowest = 0, highest = 0;
    for (const Gap::Member& member : gap.members)
        for (int i = 0; i < 4; ++i) {
            const double y = node(mesh, mesh.cells[static_cast<std::size_t>(member.cell)], i).y();
            lowest = std::min(lowest, y);
            highest = std::max(highest, y);
        }
    EXPECT_NEAR(lowest, -5.65 * mm / 2, 1e-15);
    EXPECT_NEAR(highest, 5.65 * mm / 2, 1e-15);
    // Left of a line drawn outward along +x is +y.
    EXPECT_NEAR((gap.members[0].field_per_m * gap.length_m - Vec3(0, 1, 0)).norm(), 0, 1e-15);
    EXPECT_NEAR(total_area(mesh) / (2 * pi * 54 * 8 * mm * mm), 1.0, 1e-12);
    expect_mirrored(
        mesh, [](const Vec3& p) { return Vec3(p.x(), -p.y(), 0); }, 1e-15);
}

TEST(Gap, SlantedSlitThroughALine) {
    Model model;
    model.metals = {metal("line", box(0, 0, 100 * mm, 6 * mm))};
    model.ports = {port("feed", across({-3 * mm, -3 * mm}, {3 * mm, 3 * mm}, 1 * mm))};
    const Mesh mesh = make_mesh(model, {});
    expect_sound(mesh);
    EXPECT_NEAR(total_area(mesh), 600 * mm * mm, 1e-16);
    EXPECT_NEAR(gap_area(mesh, mesh.ports[0]), 6 * mm * std::sqrt(2.0) * mm, 1e-16);
}

TEST(Gap, TwoBridgesSideBySideOnOneGap) {
    Model model = dipole(1 * mm);
    model.ports[0].placement = bridge({-1.5 * mm, 2 * mm}, {1.5 * mm, 2 * mm}, 1 * mm);
    model.lumped = {part("trim", bridge({-1.5 * mm, -2 * mm}, {1.5 * mm, -2 * mm}, 1 * mm))};
    const Mesh mesh = make_mesh(model, {});
    expect_sound(mesh);
    EXPECT_NEAR(gap_area(mesh, mesh.ports[0]), 3 * mm * mm, 1e-17);
    EXPECT_NEAR(gap_area(mesh, mesh.lumped[0]), 3 * mm * mm, 1e-17);
    expect_mirrored(
        mesh, [](const Vec3& p) { return Vec3(p.x(), -p.y(), 0); }, 1e-15);
}

TEST(Gap, BridgeJoinsStripsOfTwoWidths) {
    Model model;
    model.metals = {metal("wide", box(-41 * mm, 0, 80 * mm, 10 * mm)),
                    metal("thin", box(41 * mm, 1 * mm, 80 * mm, 3 * mm), 2)};
    for (const double width : {1 * mm, 3 * mm}) {
        model.ports = {port("feed", bridge({-1 * mm, 1 * mm}, {1 * mm, 1 * mm}, width))};
        const Mesh mesh = make_mesh(model, {});
        expect_sound(mesh);
        EXPECT_NEAR(gap_area(mesh, mesh.ports[0]), 2 * mm * width, 1e-16);
    }
}

TEST(Gap, ChainOfStripsAndGapsIsMirrored) {
    Model model;
    model.metals = {metal("line", path({-60 * mm, 0}, {{60 * mm, 0}}, 4 * mm))};
    for (const double x : {-30.0, 30.0}) {
        model.metals.push_back(cut("gap", box(x * mm, 0, 1 * mm, 8 * mm)));
        model.ports.push_back(port("p", bridge({(x - 0.5) * mm, 0}, {(x + 0.5) * mm, 0}, 1 * mm)));
    }
    const Mesh mesh = make_mesh(model, {});
    expect_sound(mesh);
    expect_mirrored(
        mesh, [](const Vec3& p) { return Vec3(-p.x(), p.y(), 0); }, 1e-15);
    EXPECT_EQ(mesh.ports[0].members.size(), mesh.ports[1].members.size());
}

TEST(Gap, ClosedPathWithASlitOverItsStart) {
    Model model;
    const double a = 30 * mm, w = 4 * mm;
    model.metals = {metal("frame", path({a, 0}, {{a, a}, {-a, a}, {-a, -a}, {a, -a}, {a, 0}}, w, true))};
    model.ports = {port("feed", across({a - w / 2, 0}, {a + w / 2, 0}, 1 * mm))};
    const Mesh mesh = make_mesh(model, {});
    expect_sound(mesh);
    EXPECT_NEAR(total_area(mesh), 8 * a * w, 1e-15);
    EXPECT_NEAR(gap_area(mesh, mesh.ports[0]), w * mm, 1e-17);
    expect_mirrored(
        mesh, [](const Vec3& p) { return Vec3(p.x(), -p.y(), 0); }, 1e-15);
}

TEST(Gap, CutBesideAJointLeavesNoSliver) {
    StripPath hook = path({-40 * mm, 0}, {{0, 0}}, 4 * mm);
    hook.pieces.push_back({true, {0, 40 * mm}, {0, 20 * mm}, pi});
    for (const double x : {-0.51, -0.5, -0.49}) {
        Model model;
        model.metals = {metal("hook", hook), cut("gap", box(x * mm, 0, 1 * mm, 8 * mm))};
        model.ports = {port("feed", bridge({(x - 0.5) * mm, 0}, {(x + 0.5) * mm, 0}, 4 * mm))};
        const Mesh mesh = make_mesh(model, {});
        expect_sound(mesh);
        EXPECT_GT(mesh_quality(mesh, 0).smallest_edge_m, 0.1 * mm);
        EXPECT_NEAR(total_area(mesh) / (4 * mm * (40 * mm + 20 * pi * mm)), 1.0, 1e-7);
    }
}

TEST(Gap, ClockwiseClosedPathWithACut) {
    Model model;
    const double a = 30 * mm, w = 4 * mm;
    model.metals = {metal("frame", path({-a, -a}, {{-a, a}, {a, a}, {a, -a}, {-a, -a}}, w, true)),
                    cut("gap", box(a, 0, 8 * mm, 2 * mm))};
    model.ports = {port("feed", bridge({a, -1 * mm}, {a, 1 * mm}, 1 * mm))};
    const Mesh mesh = make_mesh(model, {});
    expect_sound(mesh);
    EXPECT_NEAR(total_area(mesh), 8 * a * w - 2 * mm * (w - 1 * mm), 1e-15);
    expect_mirrored(
        mesh, [](const Vec3& p) { return Vec3(p.x(), -p.y(), 0); }, 1e-15);
}

TEST(Gap, ManyCutsAndPortsStayOrdered) {
    Model model = {};
    model.metals = {metal("band", ring(200 * mm, 4 * mm))};
    for (int k = 0; k < 60; ++k) {
        const double angle = 2 * pi * k / 60;
        const Vec2 out(std::cos(angle), std::sin(angle)), along(-out.y(), out.x()), at = 200 * mm * out;
        model.metals.push_back(cut("gap", box(at.x(), at.y(), 8 * mm, 1 * mm, angle), 10 + k));
        const Bridge over = bridge(at - 0.5 * mm * along, at + 0.5 * mm * along, 1 * mm);
        model.ports.push_back(port("p", over, 10 + k));
    }
    const Mesh mesh = make_mesh(model, {});
    expect_sound(mesh);
    ASSERT_EQ(mesh.ports.size(), 60u);
    for (const Gap& gap : mesh.ports) EXPECT_EQ(gap.members.size(), mesh.ports[0].members.size());
}

TEST(Gap, RandomRingsWithGapsAreSound) {
    for (unsigned seed = 1; seed <= 100; ++seed) {
        SCOPED_TRACE("seed " + std::to_string(seed));
        std::mt19937 random(seed);
        std::uniform_real_distribution<double> unit(0, 1);
        const double radius = (20 + 60 * unit(random)) * mm, width = (0.05 + 0.2 * unit(random)) * radius;
        Model model;
        model.metals = {metal("band", ring(radius, width))};
        const int gaps = 1 + static_cast<int>(4 * unit(random));
        for (int k = 0; k < gaps; ++k) {
            const double angle = 2 * pi * (k + 0.5 * unit(random)) / gaps, gap = (0.01 + 0.05 * unit(random)) * radius;
            const Vec2 out(std::cos(angle), std::sin(angle)), along(-out.y(), out.x()), at = radius * out;
            const int line = 10 + k;
            if (unit(random) < 0.5) {
                model.ports.push_back(port("p", across(at - width / 2 * out, at + width / 2 * out, gap), line));
                continue;
            }
            model.metals.push_back(cut("gap", box(at.x(), at.y(), 2 * width, gap, angle), line));
            const Bridge over = bridge(at - gap / 2 * along, at + gap / 2 * along, (0.05 + 0.8 * unit(random)) * width);
            model.ports.push_back(port("p", over, line));
        }
        MeshOptions options;
        options.cells_across = 1 + static_cast<int>(4 * unit(random));
        const Mesh mesh = make_mesh(model, options);
        const int boundary = expect_sound(mesh);
        // Annulus with gaps bridged in its middle: one piece with one hole, nodes - edges + cells = 0.
        const int edges = mesh_quality(mesh, 0).interior_edges + boundary;
        EXPECT_EQ(static_cast<int>(mesh.nodes.size()) - edges + static_cast<int>(mesh.cells.size()), 0);
        if (HasFailure()) return;
    }
}

}  // namespace
}  // namespace annulet::test
