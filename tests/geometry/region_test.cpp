#include <gtest/gtest.h>
#include <annulet/core/constants.hpp>
#include <annulet/geometry/region.hpp>

#include <cmath>
#include <random>

namespace annulet {
namespace {

using constants::pi;

std::vector<Shape> shapes() {
    StripPath path;
    path.start = {-2, 0};
    path.pieces = {CurvePiece{false, {0, 0}, {0, 0}, 0}, CurvePiece{true, {1, 1}, {0, 1}, pi / 2},
                   CurvePiece{false, {3, 1}, {0, 0}, 0}};
    path.width_start_m = 0.5;
    path.width_end_m = 0.8;
    return {Ring{{0.5, 0}, 2, 0.7},
            path,
            Polygon{{{0, 0}, {3, 0}, {1, 1}, {0, 3}}},
            Rectangle{{0.3, 0.2}, {3, 1}, 0.4},
            Disc{{0.1, -0.3}, 1.5},
            Sector{{0, 0}, 0.5, 2, 0.3, 4},
            Sector{{0, 0}, 0, 2, 0.3, 1}};
}

TEST(Region, LevelNeverExceedsTheDistanceAndHasTheRightSign) {
    std::mt19937 random(7);
    std::uniform_real_distribution<double> across(-4, 4);
    for (const Shape& shape : shapes()) {
        const Region region(shape);
        for (int i = 0; i < 400; ++i) {
            const Vec2 p(across(random), across(random)), q(across(random), across(random));
            EXPECT_LE(std::abs(region.level(p) - region.level(q)), (p - q).norm() * (1 + 1e-12));
            const double distance = distance_to(region.loops(), p);
            // Chords of one degree leave the circle by r (1 - cos 0.5 deg).
            if (distance > 1e-4) {
                EXPECT_EQ(region.level(p) < 0, inside(region.loops(), p)) << p.transpose();
            }
            EXPECT_LE(std::abs(region.level(p)), distance + 1e-4);
        }
    }
}

TEST(Region, AreasOfOutlines) {
    EXPECT_NEAR(signed_area(Region(Rectangle{{5, 5}, {3, 2}, 1}).loops()[0]), 6, 1e-12);
    EXPECT_NEAR(signed_area(Region(Disc{{0, 0}, 1}).loops()[0]), pi, 2e-4);
    EXPECT_NEAR(signed_area(Region(Sector{{0, 0}, 1, 2, 0, 1}).loops()[0]), 1.5, 2e-4);
}

TEST(Region, UnionCountsOverlapOnce) {
    const Loop a{{0, 0}, {2, 0}, {2, 2}, {0, 2}}, b{{1, 1}, {3, 1}, {3, 3}, {1, 3}};
    const std::vector<Loop> both{a, b}, ring{a, {{0.5, 0.5}, {0.5, 1.5}, {1.5, 1.5}, {1.5, 0.5}}};
    EXPECT_NEAR(union_area(both, 1e-9), 7, 1e-8);
    EXPECT_NEAR(union_area(ring, 1e-9), 3, 1e-8);
}

}  // namespace
}  // namespace annulet
