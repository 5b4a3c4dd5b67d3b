#include <gtest/gtest.h>
#include <annulet/core/constants.hpp>
#include <annulet/geometry/curve.hpp>

#include <array>
#include <cmath>

namespace annulet {
namespace {

using constants::pi;

// 3 along x, then a quarter to the left about (3, 2), then a half turn to the right about (6, 2).
Curve winding() {
    const std::array<CurvePiece, 3> pieces{CurvePiece{false, {3, 0}, {0, 0}, 0},
                                           CurvePiece{true, {5, 2}, {3, 2}, pi / 2},
                                           CurvePiece{true, {7, 2}, {6, 2}, -pi}};
    return Curve({0, 0}, pieces);
}

TEST(Curve, LengthIsTheSumOfItsPieces) {
    EXPECT_NEAR(winding().length_m(), 3 + pi + pi, 1e-14);
    EXPECT_EQ(winding().pieces().size(), 3u);
}

TEST(Curve, PointsAndTangents) {
    const Curve curve = winding();
    EXPECT_NEAR((curve.point(1) - Vec2(1, 0)).norm(), 0, 1e-15);
    EXPECT_NEAR((curve.tangent(1) - Vec2(1, 0)).norm(), 0, 1e-15);
    EXPECT_NEAR((curve.point(3 + pi / 2) - Vec2(3 + std::sqrt(2.0), 2 - std::sqrt(2.0))).norm(), 0, 1e-14);
    EXPECT_NEAR((curve.tangent(3 + pi / 2) - Vec2(1, 1).normalized()).norm(), 0, 1e-14);
    EXPECT_NEAR((curve.point(3 + 1.5 * pi) - Vec2(6, 3)).norm(), 0, 1e-14);
    EXPECT_NEAR((curve.tangent(3 + 1.5 * pi) - Vec2(1, 0)).norm(), 0, 1e-14);
    EXPECT_NEAR((curve.point(99) - Vec2(7, 2)).norm(), 0, 1e-14);
}

TEST(Curve, TangentIsTheDerivativeOfThePoint) {
    const Curve curve = winding();
    const double h = 1e-6;
    for (const double s : {0.5, 2.9, 3.4, 5.0, 6.5, 8.0}) {
        const Vec2 slope = (curve.point(s + h) - curve.point(s - h)) / (2 * h);
        EXPECT_NEAR((slope - curve.tangent(s)).norm(), 0, 1e-9) << s;
        const Vec2 bend = (curve.tangent(s + h) - curve.tangent(s - h)) / (2 * h);
        EXPECT_NEAR(bend.dot(left_of(curve.tangent(s))), curve.curvature(s), 1e-9) << s;
    }
}

TEST(Curve, CurvatureIsPositiveToTheLeft) {
    EXPECT_EQ(winding().curvature(1), 0);
    EXPECT_NEAR(winding().curvature(4), 0.5, 1e-15);
    EXPECT_NEAR(winding().curvature(8), -1, 1e-15);
}

TEST(Curve, JointsBelongToTheLaterPiece) {
    const Curve curve = winding();
    EXPECT_EQ(curve.piece_at(-1), 0u);
    EXPECT_EQ(curve.piece_at(2.999), 0u);
    EXPECT_EQ(curve.piece_at(3), 1u);
    EXPECT_EQ(curve.piece_at(99), 2u);
}

}  // namespace
}  // namespace annulet
