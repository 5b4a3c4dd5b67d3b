#include <gtest/gtest.h>
#include <annulet/core/constants.hpp>
#include <annulet/geometry/fabrication.hpp>

#include <cmath>

namespace annulet {
namespace {

constexpr double mm = 1e-3;
constexpr double allowed = 0.02 * mm;  // how well a width must be known

Rectangle box(double x, double y, double size_x, double size_y, double turn = 0) {
    return Rectangle{{x, y}, {size_x, size_y}, turn};
}

TEST(Fabrication, SlotOfKnownWidth) {
    for (const double width : {0.2 * mm, 0.5 * mm, 0.79 * mm, 0.81 * mm, 1.5 * mm}) {
        const Loops2 metal =
            without(region_of(Ring{{0, 0}, 54 * mm, 8 * mm}), region_of(box(54 * mm, 0, 16 * mm, width)));
        const auto found = narrow_slots(metal, 0.8 * mm);
        ASSERT_EQ(found.size(), width < 0.8 * mm ? 1u : 0u) << width;
        if (found.empty()) continue;
        EXPECT_NEAR(found[0].measured_m, width, allowed);
        EXPECT_NEAR(found[0].at.y(), 0.0, allowed);
        EXPECT_NEAR(found[0].at.x(), 54 * mm, 5 * mm);
        EXPECT_TRUE(narrow_webs(metal, 2 * mm).empty());
    }
}

TEST(Fabrication, WebBetweenHolesOfKnownWidth) {
    for (const double web : {0.3 * mm, 1.0 * mm, 1.9 * mm, 2.1 * mm}) {
        Loops2 plate = region_of(box(0, 0, 60 * mm, 40 * mm));
        plate = without(plate, region_of(Disc{{-5 * mm - 0.5 * web, 0}, 5 * mm}));
        plate = without(plate, region_of(Disc{{5 * mm + 0.5 * web, 0}, 5 * mm}));
        const auto found = narrow_webs(plate, 2 * mm);
        ASSERT_EQ(found.size(), web < 2 * mm ? 1u : 0u) << web;
        if (found.empty()) continue;
        EXPECT_NEAR(found[0].measured_m, web, allowed);
        EXPECT_NEAR(found[0].at.norm(), 0.0, 0.2 * mm);
    }
}

TEST(Fabrication, TurnedAndTaperedPlaces) {
    StripPath taper;
    taper.start = {0, 0};
    taper.pieces = {CurvePiece{false, {40 * mm, 30 * mm}, {0, 0}, 0}};
    taper.width_start_m = 4 * mm;
    taper.width_end_m = 0.6 * mm;
    const auto found = narrow_webs(region_of(taper), 1 * mm);
    ASSERT_EQ(found.size(), 1u);
    EXPECT_NEAR(found[0].measured_m, 0.6 * mm, allowed);
    EXPECT_NEAR((found[0].at - Vec2(40 * mm, 30 * mm)).norm(), 0.0, 1 * mm);
}

TEST(Fabrication, CornersAreNoWebsAndEdgesNoSlots) {
    const Loops2 star =
        region_of(Polygon{{{0, 0}, {20 * mm, 0}, {30 * mm, 15 * mm}, {10 * mm, 25 * mm}, {-5 * mm, 12 * mm}}});
    EXPECT_TRUE(narrow_webs(star, 2 * mm).empty());
    EXPECT_TRUE(narrow_slots(star, 2 * mm).empty());
    const Loops2 cross = united(region_of(box(0, 0, 30 * mm, 4 * mm)), region_of(box(0, 0, 4 * mm, 30 * mm)));
    EXPECT_TRUE(narrow_webs(cross, 2 * mm).empty());
    EXPECT_TRUE(narrow_slots(cross, 2 * mm).empty());
}

TEST(Fabrication, SeveralPlacesAreAllFound) {
    Loops2 comb = region_of(box(0, 0, 60 * mm, 10 * mm));
    for (int k = -2; k <= 2; ++k) comb = without(comb, region_of(box(k * 10 * mm, 3 * mm, 0.5 * mm, 6 * mm)));
    EXPECT_EQ(narrow_slots(comb, 0.8 * mm).size(), 5u);
    for (const RuleFinding& slot : narrow_slots(comb, 0.8 * mm)) EXPECT_NEAR(slot.measured_m, 0.5 * mm, allowed);
}

TEST(Fabrication, InnerCornersTooTightForTheBit) {
    const Loops2 board = without(region_of(box(0, 0, 60 * mm, 40 * mm)), region_of(box(0, 0, 20 * mm, 10 * mm)));
    const auto sharp = tight_corners(board, 1 * mm);
    ASSERT_EQ(sharp.size(), 4u);
    for (const RuleFinding& corner : sharp) {
        EXPECT_NEAR(std::abs(corner.at.x()), 10 * mm, 0.5 * mm);
        EXPECT_NEAR(std::abs(corner.at.y()), 5 * mm, 0.5 * mm);
        EXPECT_LT(corner.measured_m, 0.1 * mm);
    }
    const Loops2 rounded = without(region_of(box(0, 0, 60 * mm, 40 * mm)),
                                   offset_by(region_of(box(0, 0, 20 * mm, 10 * mm)), 1.2 * mm, 1e-7));
    EXPECT_TRUE(tight_corners(rounded, 1 * mm).empty());
    const auto tighter = tight_corners(rounded, 1.5 * mm);
    ASSERT_EQ(tighter.size(), 4u);
    for (const RuleFinding& corner : tighter) EXPECT_NEAR(corner.measured_m, 1.2 * mm, 0.1 * mm);
}

}  // namespace
}  // namespace annulet
