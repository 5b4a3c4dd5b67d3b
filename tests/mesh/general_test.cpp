#include "sheet_support.hpp"

namespace annulet::test {
namespace {

constexpr double um2 = 1e-12;

/// Sound as a strip mesh is, with triangles as well. Returns the boundary's length.
double expect_sound_cells(const Mesh& mesh) {
    std::map<std::pair<int, int>, int> directed;
    std::set<int> used, gap_cells;
    for (const Cell& cell : mesh.cells) {
        const int n = cell.corners();
        for (int i = 0; i < n; ++i) {
            const auto at = [&](int k) {
                return mesh.nodes[static_cast<std::size_t>(cell.node[static_cast<std::size_t>((k + n) % n)])];
            };
            EXPECT_GT((at(i + 1) - at(i)).cross(at(i - 1) - at(i)).z(), 0.0);
            const int a = cell.node[static_cast<std::size_t>(i)], b = cell.node[static_cast<std::size_t>((i + 1) % n)];
            EXPECT_EQ(++directed[std::make_pair(a, b)], 1) << "two cells on one side of an edge";
            used.insert(a);
        }
    }
    EXPECT_EQ(used.size(), mesh.nodes.size());
    for (const auto* gaps : {&mesh.ports, &mesh.lumped})
        for (const Gap& gap : *gaps)
            for (const Gap::Member& member : gap.members) {
                EXPECT_TRUE(gap_cells.insert(member.cell).second);
                EXPECT_NEAR(member.field_per_m.norm() * gap.length_m, 1.0, 1e-12);
            }
    for (std::size_t k = 0; k < mesh.cells.size(); ++k)
        EXPECT_EQ(mesh.cells[k].conductor == -1, gap_cells.contains(static_cast<int>(k)));
    double boundary = 0;
    for (const auto& [edge, count] : directed)
        if (!directed.contains({edge.second, edge.first}))
            boundary +=
                (mesh.nodes[static_cast<std::size_t>(edge.first)] - mesh.nodes[static_cast<std::size_t>(edge.second)])
                    .norm();
    if (const char* directory = std::getenv("SHEET_SVG")) {
        Mesh copy = mesh;
        SheetMesh flat;
        flat.level_m = {0, 0};
        for (const Vec3& p : mesh.nodes) flat.plan.push_back(p.head<2>());
        for (std::size_t k = 0; k < mesh.cells.size(); ++k) {
            flat.columns.push_back({mesh.cells[k].kind, mesh.cells[k].node});
            flat.metal_on_top.push_back(mesh.cells[k].conductor);
        }
        copy.sheets = {flat};
        (void)directory;
        draw_if_asked(copy, copy.sheets[0]);
    }
    return boundary;
}

Polygon polygon(std::vector<Vec2> corners) {
    return Polygon{std::move(corners)};
}

/// Degrees, of the triangles that do not touch the outline: outside the graded edge layer.
double smallest_angle_of_triangles(const Mesh& mesh) {
    std::set<std::pair<int, int>> edges;
    for (const Cell& cell : mesh.cells)
        for (int i = 0, n = cell.corners(); i < n; ++i) {
            const int a = cell.node[static_cast<std::size_t>(i)], b = cell.node[static_cast<std::size_t>((i + 1) % n)];
            if (edges.erase({b, a}) == 0) edges.insert({a, b});
        }
    std::set<int> outline;
    for (const auto& [a, b] : edges) outline.insert({a, b});
    double least = 180;
    for (const Cell& cell : mesh.cells) {
        if (cell.kind != CellKind::triangle) continue;
        if (std::any_of(cell.node.begin(), cell.node.begin() + 3, [&](int n) { return outline.contains(n); })) continue;
        for (int i = 0; i < 3; ++i) {
            const auto at = [&](int k) {
                return mesh.nodes[static_cast<std::size_t>(cell.node[static_cast<std::size_t>(k % 3)])];
            };
            const Vec3 a = at(i + 1) - at(i), b = at(i + 2) - at(i);
            const double angle = std::atan2(a.cross(b).norm(), a.dot(b)) * 180 / pi;
            if (angle < 20 && std::getenv("SHEET_SVG") != nullptr)
                std::printf("%.2f at %.4f %.4f, %.4f %.4f, %.4f %.4f\n", angle, at(i).x() * 1e3, at(i).y() * 1e3,
                            at(i + 1).x() * 1e3, at(i + 1).y() * 1e3, at(i + 2).x() * 1e3, at(i + 2).y() * 1e3);
            least = std::min(least, angle);
        }
    }
    return least;
}

TEST(GeneralMetal, DiscKeepsItsArea) {
    Model model;
    model.metals = {metal("patch", Disc{{3 * mm, 0}, 20 * mm})};
    const Mesh mesh = make_mesh(model, at_frequency(2e9));
    expect_sound_cells(mesh);
    EXPECT_NEAR(total_area(mesh) / (pi * 400 * mm * mm), 1.0, 2e-4);
}

TEST(GeneralMetal, SquareIsExact) {
    Model model;
    model.metals = {metal("plate", polygon({{0, 0}, {30 * mm, 0}, {30 * mm, 30 * mm}, {0, 30 * mm}}))};
    const Mesh mesh = make_mesh(model, at_frequency(2e9));
    EXPECT_NEAR(expect_sound_cells(mesh), 120 * mm, 1e-9);
    EXPECT_NEAR(total_area(mesh), 900 * mm * mm, um2);
}

TEST(GeneralMetal, TeeOfStripsIsOneConductor) {
    Model model;
    model.metals = {metal("bar", box(0, 0, 60 * mm, 4 * mm)), metal("stem", box(0, -20 * mm, 4 * mm, 40 * mm))};
    model.ports = {port("feed", across({-2 * mm, -20 * mm}, {2 * mm, -20 * mm}, 1 * mm))};
    const Mesh mesh = make_mesh(model, at_frequency(2e9));
    EXPECT_NEAR(expect_sound_cells(mesh), 2 * (60 + 38 + 4) * mm, 1e-7);
    EXPECT_NEAR(total_area(mesh), (240 + 38 * 4) * mm * mm, um2);
    EXPECT_NEAR(gap_area(mesh, mesh.ports[0]), 4 * mm * mm, um2);
}

TEST(GeneralMetal, BridgeBetweenPlates) {
    Model model;
    model.metals = {
        metal("left", polygon({{-30 * mm, -10 * mm}, {-1 * mm, -10 * mm}, {-1 * mm, 10 * mm}, {-30 * mm, 10 * mm}})),
        metal("right", polygon({{30 * mm, -10 * mm}, {30 * mm, 10 * mm}, {1 * mm, 10 * mm}, {1 * mm, -10 * mm}}))};
    model.ports = {port("feed", bridge({-1 * mm, 2 * mm}, {1 * mm, 2 * mm}, 3 * mm))};
    const Mesh mesh = make_mesh(model, at_frequency(2e9));
    expect_sound_cells(mesh);
    EXPECT_NEAR(gap_area(mesh, mesh.ports[0]), 6 * mm * mm, um2);
    EXPECT_NEAR(mesh.ports[0].length_m, 2 * mm, 1e-9);
    EXPECT_NEAR(total_area(mesh), (2 * 29 * 20 + 6) * mm * mm, um2);
}

TEST(GeneralMetal, NotchAndHole) {
    Model model;
    model.metals = {metal("strip", box(0, 0, 60 * mm, 8 * mm)), cut("notch", box(10 * mm, 4 * mm, 4 * mm, 4 * mm)),
                    cut("hole", Disc{{-12 * mm, 0}, 1.5 * mm})};
    const Mesh mesh = make_mesh(model, at_frequency(2e9));
    expect_sound_cells(mesh);
    EXPECT_NEAR(total_area(mesh), (480 - 8 - pi * 2.25) * mm * mm, 0.05 * mm * mm);
}

TEST(GeneralMetal, LaterMetalRefillsACut) {
    Model model;
    model.metals = {metal("strip", box(0, 0, 60 * mm, 8 * mm)), cut("window", box(0, 0, 20 * mm, 20 * mm)),
                    metal("rail", box(0, 0, 22 * mm, 2 * mm))};
    const Mesh mesh = make_mesh(model, at_frequency(2e9));
    expect_sound_cells(mesh);
    EXPECT_NEAR(total_area(mesh), (40 * 8 + 20 * 2) * mm * mm, um2);
}

TEST(GeneralMetal, BridgeToTheSideOfAStrip) {
    Model rails;
    rails.metals = {metal("a", box(0, 0, 100 * mm, 4 * mm)), metal("b", box(0, 8 * mm, 100 * mm, 4 * mm))};
    rails.ports = {port("feed", bridge({0, 2 * mm}, {0, 6 * mm}, 1 * mm))};
    const Mesh mesh = make_mesh(rails, at_frequency(2e9));
    expect_sound_cells(mesh);
    EXPECT_NEAR(gap_area(mesh, mesh.ports[0]), 4 * mm * mm, um2);
}

TEST(GeneralMetal, SlottedTappedLoop) {
    Model model;
    model.metals = {metal("band", ring(30 * mm, 8 * mm)), cut("slot", box(0, 30 * mm, 24 * mm, 1 * mm)),
                    metal("tap", box(18 * mm, 0, 20 * mm, 3 * mm))};
    model.ports = {port("feed", across({-34 * mm, 0}, {-26 * mm, 0}, 2 * mm))};
    for (const double refine : {1.0, 2.0}) {
        const Mesh mesh = make_mesh(model, at_frequency(1.5e9, refine));
        expect_sound_cells(mesh);
        EXPECT_GE(smallest_angle_of_triangles(mesh), 20.0);
        EXPECT_LE(mesh.cells.size(), 900 * refine * refine);
    }
}

TEST(GeneralMetal, RingAsDiscMinusDiscHasTheAreaOfTheRing) {
    Model model;
    model.metals = {metal("disc", Disc{{0, 0}, 58 * mm}), cut("hole", Disc{{0, 0}, 50 * mm})};
    model.ports = {port("feed", across({50 * mm, 0}, {58 * mm, 0}, 5.65 * mm))};
    const Mesh mesh = make_mesh(model, at_frequency(1.5e9));
    expect_sound_cells(mesh);
    EXPECT_NEAR(total_area(mesh) / (2 * pi * 54 * 8 * mm * mm), 1.0, 2e-4);
}

TEST(GeneralMetal, StripsFarAwayKeepTheirQuadrilaterals) {
    Model model;
    model.metals = {metal("patch", Disc{{0, 0}, 10 * mm}), metal("strip", box(0, 30 * mm, 60 * mm, 4 * mm))};
    const Mesh mesh = make_mesh(model, at_frequency(2e9));
    Model alone = model;
    alone.metals.erase(alone.metals.begin());
    const Mesh strip = make_mesh(alone, at_frequency(2e9));
    ASSERT_GT(mesh.cells.size(), strip.cells.size());
    for (std::size_t k = 0; k < strip.cells.size(); ++k) EXPECT_EQ(mesh.cells[k].kind, CellKind::quadrilateral);
}

TEST(GeneralMetal, PatchOnASheet) {
    Model model;
    model.metals = {
        metal("patch", polygon({{-15 * mm, -10 * mm}, {20 * mm, -10 * mm}, {12 * mm, 10 * mm}, {-15 * mm, 10 * mm}}))};
    model.laminates = {sheet("board", box(0, 0, 60 * mm, 40 * mm), 0, 1.6 * mm)};
    const Mesh mesh = make_mesh(model, at_frequency(2e9));
    expect_sound_cells(mesh);
    expect_sound_sheet(mesh, mesh.sheets[0]);
    EXPECT_EQ(covered_cells(mesh.sheets[0].metal_on_top), static_cast<int>(mesh.cells.size()));
    EXPECT_NEAR(plan_area(mesh.sheets[0]), 2400 * mm * mm, 1e-9);
}

TEST(GeneralMetal, PatchThatOverhangsTheSheetIsDividedAtItsEdge) {
    Model model;
    model.metals = {
        metal("patch", polygon({{-15 * mm, -10 * mm}, {20 * mm, -10 * mm}, {20 * mm, 10 * mm}, {-15 * mm, 10 * mm}}))};
    model.laminates = {sheet("board", box(0, 0, 30 * mm, 30 * mm), 0, 1.6 * mm)};
    const Mesh mesh = make_mesh(model, at_frequency(2e9));
    expect_sound_cells(mesh);
    expect_sound_sheet(mesh, mesh.sheets[0]);
    EXPECT_NEAR(plan_area(mesh.sheets[0]), 900 * mm * mm, 1e-9);
    EXPECT_LT(covered_cells(mesh.sheets[0].metal_on_top), static_cast<int>(mesh.cells.size()));
}

}  // namespace
}  // namespace annulet::test
