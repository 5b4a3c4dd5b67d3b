#include "sheet_support.hpp"

namespace annulet::test {
namespace {

constexpr double t = 1.6 * mm;

Model river_gauge() {
    Model model;
    model.metals = {metal("band", ring(54 * mm, 8 * mm))};
    model.ports = {port("feed", across({50 * mm, 0}, {58 * mm, 0}, 5.65 * mm))};
    model.laminates = {sheet("board", ring(54 * mm, 14 * mm), 0, t)};
    return model;
}

Model dipole(double margin, double width = 8 * mm) {
    Model model;
    model.metals = {metal("strip", box(0, 0, 159 * mm, width))};
    model.ports = {port("feed", across({0, -width / 2}, {0, width / 2}, 3 * mm))};
    model.laminates = {sheet("board", box(0, 0, 159 * mm + 2 * margin, width + 2 * margin), 0, t)};
    return model;
}

TEST(Sheet, RingOnARingHasFewColumns) {
    const Mesh mesh = make_mesh(river_gauge(), at_frequency(1500e6));
    ASSERT_EQ(mesh.sheets.size(), 1u);
    const SheetMesh& board = mesh.sheets[0];
    expect_sound_sheet(mesh, board, 2);
    EXPECT_EQ(covered_cells(board.metal_on_top), static_cast<int>(mesh.cells.size()));
    EXPECT_TRUE(board.metal_on_bottom.empty());
    EXPECT_LE(board.columns.size(), 350u);
    EXPECT_NEAR(plan_area(board), 2 * pi * 54 * mm * 14 * mm, 1e-3 * plan_area(board));
    for (const auto& column : board.columns) EXPECT_EQ(column.kind, CellKind::quadrilateral);
}

TEST(Sheet, LayerNextToMetalIsHalfAsThick) {
    Model model = river_gauge();
    const auto levels = [&](const MeshOptions& options) { return make_mesh(model, options).sheets[0].level_m; };
    const std::vector<double> two = levels(at_frequency(1500e6));
    ASSERT_EQ(two.size(), 3u);
    EXPECT_NEAR(two[2] - two[1], t / 3, 1e-12);
    EXPECT_NEAR(two[1] - two[0], 2 * t / 3, 1e-12);
    EXPECT_EQ(levels(at_frequency(1500e6, 2)).size(), 5u);
    model.laminates[0].top_m = t;  // the metal now lies on its lower face
    const std::vector<double> below = levels(at_frequency(1500e6));
    EXPECT_NEAR(below[1] - below[0], t / 3, 1e-12);
    model.laminates[0].top_m = 5 * mm;  // and now the sheet is a lid
    const std::vector<double> lid = levels(at_frequency(1500e6));
    EXPECT_NEAR(lid[1] - lid[0], t / 2, 1e-12);
}

TEST(Sheet, StripOnARectangle) {
    for (const double margin : {0.0, 0.5 * mm, 5 * mm, 20 * mm}) {
        const Mesh mesh = make_mesh(dipole(margin), at_frequency(900e6));
        const SheetMesh& board = mesh.sheets[0];
        expect_sound_sheet(mesh, board);
        EXPECT_EQ(covered_cells(board.metal_on_top), static_cast<int>(mesh.cells.size()));
        EXPECT_NEAR(plan_area(board) / ((159 * mm + 2 * margin) * (8 * mm + 2 * margin)), 1.0, 1e-9);
        for (const auto& column : board.columns) EXPECT_EQ(column.kind, CellKind::quadrilateral);
        if (margin == 0) {
            EXPECT_EQ(board.columns.size(), mesh.cells.size());
        }
        EXPECT_LE(board.columns.size(), 400u) << margin;
    }
}

TEST(Sheet, GapBesideANarrowBridgeIsFilled) {
    Model model = gauge_ring(1.2 * mm);
    model.laminates = {sheet("board", ring(54.9 * mm, 14 * mm), 0, t)};
    const Mesh mesh = make_mesh(model, at_frequency(1500e6));
    const SheetMesh& board = mesh.sheets[0];
    expect_sound_sheet(mesh, board, 2);
    EXPECT_EQ(covered_cells(board.metal_on_top), static_cast<int>(mesh.cells.size()));
    EXPECT_NEAR(plan_area(board), 2 * pi * 54.9 * mm * 14 * mm, 1e-3 * plan_area(board));
    for (const auto& column : board.columns) EXPECT_EQ(column.kind, CellKind::quadrilateral);
}

TEST(Sheet, OpeningUnderTheGapLeavesTheBridgeInAir) {
    Model model = gauge_ring(8 * mm);
    model.laminates = {sheet("board", ring(54.9 * mm, 14 * mm), 0, t)};
    model.laminates[0].openings = {box(54.9 * mm, 0, 8 * mm, 1.2 * mm)};
    const Mesh mesh = make_mesh(model, at_frequency(1500e6));
    const SheetMesh& board = mesh.sheets[0];
    expect_sound_sheet(mesh, board, 3);
    EXPECT_EQ(covered_cells(board.metal_on_top), static_cast<int>(mesh.cells.size() - mesh.ports[0].members.size()));
    EXPECT_NEAR(plan_area(board), 2 * pi * 54.9 * mm * 14 * mm - 9.6 * mm * mm, 2e-3 * plan_area(board));
}

TEST(Sheet, OpeningAcrossTheBandPutsALineOfCellsAtItsEdges) {
    Model model = river_gauge();
    model.laminates[0].openings = {box(-54 * mm, 0, 20 * mm, 10 * mm)};
    const Mesh mesh = make_mesh(model, at_frequency(1500e6));
    const SheetMesh& board = mesh.sheets[0];
    expect_sound_sheet(mesh, board);
    EXPECT_LT(covered_cells(board.metal_on_top), static_cast<int>(mesh.cells.size()));
    EXPECT_NEAR(plan_area(board), 2 * pi * 54 * mm * 14 * mm - 140 * mm * mm, 3e-3 * plan_area(board));
    double over = 0;  // metal over the opening
    std::set<int> covered(board.metal_on_top.begin(), board.metal_on_top.end());
    for (std::size_t k = 0; k < mesh.cells.size(); ++k)
        if (!covered.contains(static_cast<int>(k))) over += cell_area_m2(mesh, mesh.cells[k]);
    EXPECT_NEAR(over, 80 * mm * mm, 0.8 * mm * mm);
}

TEST(Sheet, RingOnARectangularBoard) {
    Model model = river_gauge();
    model.laminates[0].outline = Shape(box(5 * mm, 0, 150 * mm, 130 * mm));
    const Mesh mesh = make_mesh(model, at_frequency(1500e6));
    const SheetMesh& board = mesh.sheets[0];
    expect_sound_sheet(mesh, board);
    EXPECT_EQ(covered_cells(board.metal_on_top), static_cast<int>(mesh.cells.size()));
    EXPECT_NEAR(plan_area(board), 150 * mm * 130 * mm, 1e-6 * plan_area(board));
    EXPECT_LE(board.columns.size(), 900u);
    EXPECT_GE(smallest_triangle_angle(board), 15.0);
}

TEST(Sheet, FollowsABentStripAtAMargin) {
    Model model;
    model.metals = {metal("bent", path({-40 * mm, 0}, {{0, 0}, {0, 50 * mm}}, 4 * mm))};
    model.ports = {port("feed", across({-20 * mm, -2 * mm}, {-20 * mm, 2 * mm}, 1 * mm))};
    model.laminates = {sheet("board", ring(1, 0.1), 0, t)};
    model.laminates[0].outline = AroundMetal{"bent", 3 * mm};
    const Mesh mesh = make_mesh(model, at_frequency(1500e6));
    expect_sound_sheet(mesh, mesh.sheets[0]);
    EXPECT_EQ(covered_cells(mesh.sheets[0].metal_on_top), static_cast<int>(mesh.cells.size()));
    // Strip, margins along its sides, ends, the quarter circles at four corners of its ends and at the outer bend.
    const double strip = 92 * 4 - 8, sides = 2 * 90 * 3 - 9, ends = 2 * 4 * 3, rounds = pi * 9 + 0.25 * pi * 9;
    EXPECT_NEAR(plan_area(mesh.sheets[0]) / (mm * mm), strip + sides + ends + rounds, 3.0);
}

TEST(Sheet, TwoStripsOnOneBoard) {
    Model model;
    model.metals = {metal("left", box(-41 * mm, 0, 80 * mm, 6 * mm)), metal("right", box(41 * mm, 0, 80 * mm, 6 * mm)),
                    metal("parasite", box(0, 20 * mm, 150 * mm, 3 * mm))};
    model.ports = {port("feed", bridge({-1 * mm, 0}, {1 * mm, 0}, 2 * mm))};
    model.laminates = {sheet("board", box(0, 8 * mm, 180 * mm, 50 * mm), 0, t)};
    const Mesh mesh = make_mesh(model, at_frequency(1500e6));
    expect_sound_sheet(mesh, mesh.sheets[0]);
    EXPECT_EQ(covered_cells(mesh.sheets[0].metal_on_top), static_cast<int>(mesh.cells.size()));
    EXPECT_NEAR(plan_area(mesh.sheets[0]), 180 * 50 * mm * mm, 1e-8);
}

TEST(Sheet, MetalOnBothFacesAndALid) {
    Model model = dipole(10 * mm);
    Metal mirror = metal("mirror", box(0, 0, 159 * mm, 8 * mm));
    mirror.shape = box(0, 7 * mm, 100 * mm, 3 * mm);
    mirror.plane_m = -t;
    model.metals.push_back(mirror);
    model.laminates.push_back(sheet("lid", Disc{{0, 0}, 60 * mm}, 12 * mm, 2 * mm));
    const Mesh mesh = make_mesh(model, at_frequency(900e6));
    ASSERT_EQ(mesh.sheets.size(), 2u);
    expect_sound_sheet(mesh, mesh.sheets[0]);
    EXPECT_EQ(covered_cells(mesh.sheets[0].metal_on_top) + covered_cells(mesh.sheets[0].metal_on_bottom),
              static_cast<int>(mesh.cells.size()));
    expect_sound_sheet(mesh, mesh.sheets[1]);
    EXPECT_TRUE(mesh.sheets[1].metal_on_top.empty());
    EXPECT_NEAR(plan_area(mesh.sheets[1]), pi * 60 * 60 * mm * mm, 0.05 * plan_area(mesh.sheets[1]));
}

}  // namespace
}  // namespace annulet::test
