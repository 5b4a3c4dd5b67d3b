#include "model/expression.hpp"

#include <annulet/core/constants.hpp>

#include <gtest/gtest.h>

#include <cmath>
#include <map>

namespace annulet {
namespace {

using constants::pi;

Quantity value_of(const std::string& text) {
    static const std::map<std::string, Quantity> known{
        {"radius", {54.9, {}, false}},
        {"width", {8e-3, kinds::length.dimension, false}},
        {"f0", {868.3e6, kinds::frequency.dimension, false}},
    };
    ExpressionScope scope;
    scope.lookup = [](const std::string& name, std::size_t) { return known.at(name); };
    return evaluate_expression(text, scope);
}

void expect(const std::string& text, double value, const Dimension& dimension, bool ratio = false) {
    const Quantity found = value_of(text);
    EXPECT_NEAR(found.value, value, 1e-14 * std::abs(value)) << text;
    EXPECT_EQ(found.dimension, dimension) << text;
    EXPECT_EQ(found.ratio, ratio) << text;
}

TEST(Expression, Arithmetic) {
    expect("1 + 2*3", 7, {});
    expect("(1 + 2)*3", 9, {});
    expect("8 - 3 - 2", 3, {});
    expect("16/4/2", 2, {});
    expect("-2^2", -4, {});
    expect("2^3^2", 512, {});
    expect("2^-1", 0.5, {});
    expect("2*-3", -6, {});
    expect("1.5e3", 1500, {});
    expect("  .5 ", 0.5, {});
    expect("2*pi", 2 * pi, {});
}

TEST(Expression, UnitsAndKinds) {
    const Dimension length = kinds::length.dimension;
    expect("8 mm", 8e-3, length);
    expect("8mm", 8e-3, length);
    expect("2*width + 0.5 mm", 16.5e-3, length);
    expect("c/(4*f0)", 299792458.0 / (4 * 868.3e6), length);
    expect("15 deg", pi / 12, kinds::angle.dimension);
    expect("5.8e7 S/m", 5.8e7, kinds::conductivity.dimension);
    expect("5 %", 0.05, {}, true);
    expect("width / 2 mm", 4, {}, true);
    expect("1/(2*pi*sqrt(12 nH * 2 pF))", 1 / (2 * pi * std::sqrt(24e-21)), kinds::frequency.dimension);
    expect("(3 mm)^2", 9e-6, power(length, 2));
    expect("width*(1 + 10 %)", 8.8e-3, length);
}

TEST(Expression, BareNumbersTakeTheUnitBesideThem) {
    expect("radius + 0.5 mm", 55.4e-3, kinds::length.dimension);
    expect("0.5 mm + radius", 55.4e-3, kinds::length.dimension);
    expect("45 + 15 deg", pi / 3, kinds::angle.dimension);
    expect("max(1, 500 kHz, 3)", 500e3, kinds::frequency.dimension);
    // A bare number times a sine stays bare: it may still be a length.
    expect("radius*sin(30 deg)", 54.9 / 2, {});
}

TEST(Expression, Functions) {
    expect("sqrt(9)", 3, {});
    expect("sin(90 deg)", 1, {}, true);
    expect("cos(pi * 1 rad)", -1, {}, true);
    expect("tan(45 deg)", 1, {}, true);
    expect("asin(1)", pi / 2, kinds::angle.dimension);
    expect("acos(0)", pi / 2, kinds::angle.dimension);
    expect("atan(1)", pi / 4, kinds::angle.dimension);
    expect("atan2(-1 mm, -1 mm)", -3 * pi / 4, kinds::angle.dimension);
    expect("hypot(3 mm, 4)", 5e-3, kinds::length.dimension);
    expect("abs(-3 mm)", 3e-3, kinds::length.dimension);
    expect("min(3, 2, 5)", 2, {});
}

TEST(Expression, NestingIsBounded) {
    EXPECT_EQ(value_of(std::string(90, '(') + "1" + std::string(90, ')')).value, 1);
    for (const char* opening : {"(", "-", "sqrt(", "2^", "1+("}) {
        std::string text;
        while (text.size() + 8 < longest_expression) text += opening;
        EXPECT_THROW(value_of(text + "1"), ExpressionFault) << opening;
    }
    EXPECT_THROW(value_of(std::string(longest_expression + 1, '1')), ExpressionFault);
}

}  // namespace
}  // namespace annulet
