#include "model/outline.hpp"

#include <annulet/core/constants.hpp>
#include <annulet/model/drawing.hpp>
#include <annulet/model/materials.hpp>

#include "fault_case.hpp"

#include <gtest/gtest.h>

#include <cmath>

namespace annulet {
namespace {

using constants::pi;

Model model_of(const std::string& body) {
    const std::string text = "[[metal]]\nname = \"band\"\nplane = \"2 mm\"\n" + body + "\n";
    EXPECT_EQ(faults_of(text), "");
    return evaluate(read_drawing(text, "m.toml"));
}

template <class T>
T shape_of(const std::string& body) {
    return std::get<T>(model_of(body).metals.at(0).shape);
}

TEST(Shapes, Planar) {
    const Sector sector =
        shape_of<Sector>("sector = { center = [1, 2], outer_radius = 5, start = 90, sweep = \"60 deg\" }");
    EXPECT_NEAR(sector.sweep_rad, pi / 3, 1e-15);
    EXPECT_NEAR(sector.start_rad, pi / 2, 1e-15);
    EXPECT_EQ(sector.inner_radius_m, 0);
    const Rectangle rectangle = shape_of<Rectangle>("rectangle = { center = [0, 0], size = [4, 2], rotation = 45 }");
    EXPECT_NEAR(rectangle.rotation_rad, pi / 4, 1e-15);
    EXPECT_EQ(shape_of<Disc>("disc = { center = [0, 0], radius = 5 }").radius_m, 5e-3);
    EXPECT_EQ(shape_of<Polygon>("polygon = { points = [[0, 0], [1, 0], [0, 1], [0, 0]] }").corners.size(), 3U);
    EXPECT_EQ(shape_of<Polygon>("polygon = [[0, 0], [1, 0], [1, 1], [0, 1]]").corners.size(), 4U);
}

TEST(Shapes, PathOfLinesAndArcs) {
    const StripPath path = shape_of<StripPath>(
        "path = { points = [[0, 0], [10, 0], { arc = { center = [10, 5], sweep = \"90 deg\" } }, [15, 20]], width = "
        "[2, 1] }");
    ASSERT_EQ(path.pieces.size(), 3U);
    EXPECT_TRUE(path.pieces[1].is_arc);
    EXPECT_NEAR(path.pieces[1].end.x(), 15e-3, 1e-15);
    EXPECT_NEAR(path.pieces[1].end.y(), 5e-3, 1e-15);
    EXPECT_EQ(path.width_start_m, 2e-3);
    EXPECT_EQ(path.width_end_m, 1e-3);
    EXPECT_FALSE(path.closed);
}

TEST(Shapes, ClosedPaths) {
    const StripPath square =
        shape_of<StripPath>("path = { points = [[0, 0], [10, 0], [10, 10], [0, 10]], width = 1, closed = true }");
    EXPECT_TRUE(square.closed);
    ASSERT_EQ(square.pieces.size(), 4U);
    EXPECT_EQ(square.pieces.back().end, square.start);
    const StripPath circle =
        shape_of<StripPath>("path = { points = [[5, 0], { arc = { center = [0, 0], sweep = 360 } }], width = 1 }");
    EXPECT_TRUE(circle.closed);
    EXPECT_EQ(circle.pieces.size(), 1U);
    EXPECT_TRUE(shape_of<StripPath>("path = { points = [[0, 0], [10, 0], [10, 10], [0, 0]], width = 1 }").closed);
}

TEST(Shapes, Conductors) {
    const std::string disc = "disc = { center = [0, 0], radius = 5 }\n";
    EXPECT_EQ(model_of(disc).metals[0].conductor.name, "copper");
    EXPECT_NEAR(model_of(disc).metals[0].conductor.thickness_m, 35e-6, 1e-18);
    EXPECT_TRUE(model_of(disc + "material = \"perfect\"").metals[0].conductor.perfect());
    EXPECT_TRUE(model_of(disc + "conductivity = \"perfect\"").metals[0].conductor.perfect());
    EXPECT_DOUBLE_EQ(model_of(disc + "conductivity = \"1.2e7 S/m\"").metals[0].conductor.conductivity_s_per_m, 1.2e7);
    EXPECT_DOUBLE_EQ(model_of(disc + "roughness = \"1.5 um\"").metals[0].conductor.roughness_rms_m, 1.5e-6);
}

// Relative conductivity against annealed copper, from memory of common tables: silver 1.05 to 1.09, gold 0.70 to 0.78,
// aluminium from 0.61 (conductor grade) to 0.655 (pure metal, 64.9 to 65.5 % of the copper standard).
TEST(Shapes, Materials) {
    const double copper = find_material("copper")->conductivity_s_per_m;
    const auto relative = [&](const char* name) { return find_material(name)->conductivity_s_per_m / copper; };
    EXPECT_NEAR(relative("silver"), 1.07, 0.02);
    EXPECT_NEAR(relative("gold"), 0.74, 0.04);
    EXPECT_GT(relative("aluminium"), 0.61);
    EXPECT_LT(relative("aluminium"), 0.655);
    EXPECT_FALSE(find_material("kryptonite"));
    EXPECT_EQ(material_names().size(), 12U);
}

TEST(Outline, Crossings) {
    const std::vector<Vec2> square{{0, 0}, {1, 0}, {1, 1}, {0, 1}}, bow{{0, 0}, {1, 1}, {1, 0}, {0, 1}};
    EXPECT_FALSE(first_crossing(square, true));
    EXPECT_TRUE(first_crossing(bow, true));
    EXPECT_EQ(*first_crossing(bow, true), (std::pair<std::size_t, std::size_t>{0, 2}));
    const std::vector<Vec2> touches{{0, 0}, {2, 0}, {2, 2}, {1, 0}, {0, 2}};
    EXPECT_TRUE(first_crossing(touches, true));
    const std::vector<Vec2> back{{0, 0}, {2, 0}, {1, 0}}, on{{0, 0}, {1, 0}, {2, 0}};
    EXPECT_TRUE(first_crossing(back, false));
    EXPECT_FALSE(first_crossing(on, false));
    std::vector<Vec2> star;
    for (int i = 0; i < 2000; ++i)
        star.emplace_back(std::cos(i * 2 * pi / 2000) * (1 + i % 2), std::sin(i * 2 * pi / 2000) * (1 + i % 2));
    EXPECT_FALSE(first_crossing(star, true));
    std::swap(star[100], star[104]);
    EXPECT_TRUE(first_crossing(star, true));
}

// Areas of elementary geometry; a chord polygon of a circle with steps of 2 degrees loses 2.0e-4 of it.
TEST(Outline, Areas) {
    const auto area = [](const Shape& shape) {
        return common_area_m2(outline_loops(shape), {}, outline_loops(shape), {});
    };
    EXPECT_NEAR(area(Disc{{0, 0}, 1e-2}), pi * 1e-4, 3e-4 * pi * 1e-4);
    EXPECT_NEAR(area(Ring{{0, 0}, 1e-2, 4e-3}), 2 * pi * 1e-2 * 4e-3, 3e-4 * 2 * pi * 4e-5);
    EXPECT_NEAR(area(Rectangle{{1, 2}, {3e-3, 2e-3}, 0.3}), 6e-6, 1e-11);
    EXPECT_NEAR(area(Sector{{0, 0}, 0, 1e-2, 0.2, pi / 2}), pi / 4 * 1e-4, 3e-4 * pi / 4 * 1e-4);
    EXPECT_NEAR(area(Sector{{0, 0}, 5e-3, 1e-2, 0.2, pi / 2}), pi / 4 * 0.75e-4, 3e-4 * pi / 4 * 1e-4);
    StripPath path{{0, 0}, {{false, {1e-2, 0}, {0, 0}, 0}}, 2e-3, 2e-3, false};
    EXPECT_NEAR(area(path), 2e-5, 1e-10);
    const Loops grown_square = grown(outline_loops(Rectangle{{0, 0}, {1e-2, 1e-2}, 0}), 1e-3);
    EXPECT_NEAR(common_area_m2(grown_square, {}, grown_square, {}), 1.44e-4, 1e-9);
}

TEST(Outline, TouchingSheetsDoNotOverlap) {
    const auto sheet = [](const std::string& name, double top, const std::string& outline) {
        return "[[laminate]]\nname = \"" + name + "\"\ntop = " + std::to_string(top) +
               "\nthickness = 1\npermittivity = 4.3\noutline = " + outline + "\n";
    };
    const std::string metal =
        "[[metal]]\nname = \"band\"\nplane = 0\nring = { center = [0, 0], radius = 20, width = 4 }\n";
    const std::string ring = "{ around = { metal = \"band\", margin = 1 } }";
    const auto disc = [](double r) { return "{ disc = { center = [0, 0], radius = " + std::to_string(r) + " } }"; };
    EXPECT_EQ(faults_of(metal + sheet("a", 0, disc(30)) + sheet("b", 1, disc(30))), "");
    EXPECT_EQ(faults_of(metal + sheet("a", 0, ring) + sheet("b", 0, disc(16))), "");
    EXPECT_NE(faults_of(metal + sheet("a", 0, ring) + sheet("b", 0, disc(17.5))), "");
    EXPECT_EQ(faults_of(metal + sheet("a", 0, "{ rectangle = { center = [0, 0], size = [10, 10] } }") +
                        sheet("b", 0, "{ rectangle = { center = [10, 0], size = [10, 10] } }")),
              "");
}

}  // namespace
}  // namespace annulet
