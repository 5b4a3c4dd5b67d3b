#include <gtest/gtest.h>
#include <annulet/core/constants.hpp>
#include <annulet/geometry/ribbon.hpp>

#include <cmath>

namespace annulet {
namespace {

using constants::pi;

StripPath corner(double angle_rad) {
    StripPath path;
    path.start = {-10, 0};
    path.pieces = {CurvePiece{false, {0, 0}, {0, 0}, 0},
                   CurvePiece{false, {10 * std::cos(angle_rad), 10 * std::sin(angle_rad)}, {0, 0}, 0}};
    path.width_start_m = path.width_end_m = 2;
    return path;
}

TEST(Ribbon, CornerLineLiesOnTheBisectorAndMeetsBothEdges) {
    for (const double angle : {0.3, pi / 2, -2.0}) {
        const Ribbon ribbon(corner(angle));
        EXPECT_TRUE(ribbon.kinked(1));
        const Vec2 after(std::cos(angle), std::sin(angle));
        for (const double tau : {-1.0, -0.4, 1.0}) {
            const Vec2 p = ribbon.point(10, tau);
            EXPECT_NEAR(p.y(), tau, 1e-14);
            EXPECT_NEAR(p.dot(left_of(after)), tau, 1e-14);
        }
    }
}

TEST(Ribbon, LinesOfARingAreCircles) {
    const Ribbon ribbon(Ring{{1, 2}, 5, 2});
    EXPECT_TRUE(ribbon.closed());
    EXPECT_FALSE(ribbon.has_seam());
    for (const double s : {0.0, 3.0, 31.0, -2.0, 40.0}) {
        EXPECT_NEAR((ribbon.point(s, -1) - Vec2(1, 2)).norm(), 6, 1e-14);
        EXPECT_NEAR((ribbon.point(s, 1) - Vec2(1, 2)).norm(), 4, 1e-14);
    }
    EXPECT_NEAR((ribbon.point(-2, 0.5) - ribbon.point(ribbon.length_m() - 2, 0.5)).norm(), 0, 1e-13);
}

TEST(Ribbon, SpeedBoundsTheStepAlongEveryLine) {
    StripPath path = corner(1.0);
    path.width_end_m = 3;
    path.pieces.push_back({true, path.pieces[1].end + Vec2(-8, 0), path.pieces[1].end + Vec2(-4, 0), pi});
    const Ribbon ribbon(path);
    for (std::size_t k = 0; k < 3; ++k)
        for (const double tau : {-1.0, 0.3, 1.0})
            for (double u = 0; u < 0.99; u += 0.01) {
                const double step =
                    (ribbon.sample_on(k, u + 0.01, tau).point - ribbon.sample_on(k, u, tau).point).norm();
                EXPECT_LE(step, ribbon.speed(k, tau) * 0.01 * ribbon.centre().pieces()[k].length_m * (1 + 1e-9));
            }
}

TEST(Ribbon, LinesAreContinuousAtJoints) {
    StripPath path = corner(0.7);
    path.width_end_m = 1;
    const Vec2 end = path.pieces[1].end, ahead(std::cos(0.7), std::sin(0.7));
    const Vec2 centre = end + 6 * left_of(ahead);
    path.pieces.push_back({true, centre + 6 * ahead, centre, pi / 2});
    const Ribbon ribbon(path);
    EXPECT_FALSE(ribbon.kinked(2));
    for (std::size_t k = 1; k < 3; ++k)
        for (const double tau : {-1.0, 0.5, 1.0})
            EXPECT_NEAR((ribbon.sample_on(k - 1, 1, tau).point - ribbon.sample_on(k, 0, tau).point).norm(), 0, 1e-14);
}

TEST(Ribbon, RectangleRunsAlongItsLongerSide) {
    const auto ribbon = ribbon_of(Rectangle{{1, 1}, {2, 8}, 0});
    ASSERT_TRUE(ribbon.has_value());
    EXPECT_NEAR(ribbon->length_m(), 8, 1e-15);
    EXPECT_NEAR(ribbon->width_m(3), 2, 1e-15);
    EXPECT_NEAR((ribbon->point(0, 1) - Vec2(0, -3)).norm(), 0, 1e-14);
}

TEST(Ribbon, SectorIsAnArcStrip) {
    const auto ribbon = ribbon_of(Sector{{0, 0}, 4, 6, 0, pi / 2});
    ASSERT_TRUE(ribbon.has_value());
    EXPECT_NEAR(ribbon->length_m(), 5 * pi / 2, 1e-14);
    EXPECT_NEAR((ribbon->point(0, -1) - Vec2(6, 0)).norm(), 0, 1e-14);
    EXPECT_TRUE(ribbon_of(Sector{{0, 0}, 4, 6, 0, 2 * pi})->closed());
    EXPECT_FALSE(ribbon_of(Sector{{0, 0}, 0, 6, 0, 1}).has_value());
    EXPECT_FALSE(ribbon_of(Disc{{0, 0}, 6}).has_value());
}

TEST(Flaw, SoundShapesHaveNone) {
    EXPECT_EQ(flaw(corner(1.0)), "");
    EXPECT_EQ(flaw(Ring{{0, 0}, 5, 2}), "");
    EXPECT_EQ(flaw(Rectangle{{0, 0}, {1, 2}, 0}), "");
}

TEST(Flaw, EachFaultHasItsText) {
    EXPECT_EQ(flaw(corner(3.1)), "folds back on itself at (0, 0) mm");
    EXPECT_EQ(flaw(Disc{{0, 0}, -1e-3}), "has a radius of -1 mm, which is not positive");
    EXPECT_EQ(flaw(Sector{{0, 0}, 6e-3, 4e-3, 0, 1}), "has an inner radius of 6 mm and an outer one of 4 mm");
    EXPECT_EQ(flaw(Sector{{0, 0}, 4e-3, 6e-3, 0, 0}), "has no length");
    EXPECT_EQ(flaw(Polygon{{{0, 0}, {1, 0}}}), "has fewer than three corners");
    StripPath path = corner(1.0);
    path.width_end_m = -1e-3;
    EXPECT_EQ(flaw(path), "has a width of -1 mm, which is not positive");
    path = corner(1.0);
    path.pieces.push_back({true, {0, 0}, {3, 3}, 1});
    EXPECT_EQ(flaw(path), "has an arc in piece 3 of its path whose ends are at different distances from its centre");
}

}  // namespace
}  // namespace annulet
