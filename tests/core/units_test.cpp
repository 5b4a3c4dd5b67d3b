#include <annulet/core/constants.hpp>
#include <annulet/core/units.hpp>

#include <gtest/gtest.h>

#include <cmath>

namespace annulet {
namespace {

std::string message_of(const std::string& text, const Kind& kind) {
    try {
        parse_quantity(text, kind, "--from");
    } catch (const InputError& error) {
        return error.faults().at(0).message + "|" + error.faults().at(0).help;
    }
    return "no fault";
}

TEST(Units, OptionsTakeNumberAndUnit) {
    EXPECT_DOUBLE_EQ(parse_quantity("868.3 MHz", kinds::frequency, "--from"), 868.3e6);
    EXPECT_DOUBLE_EQ(parse_quantity(" 868.3MHz ", kinds::frequency, "--from"), 868.3e6);
    EXPECT_DOUBLE_EQ(parse_quantity("2e9", kinds::frequency, "--from"), 2e9);
    EXPECT_DOUBLE_EQ(parse_quantity("5 %", kinds::fraction, "--spread"), 0.05);
    EXPECT_DOUBLE_EQ(parse_quantity("8", kinds::length, "--margin", 1e-3), 8e-3);
    EXPECT_DOUBLE_EQ(parse_quantity("1 mil", kinds::length, "--margin"), 25.4e-6);
    EXPECT_DOUBLE_EQ(parse_quantity("58 MS/m", kinds::conductivity, "--sigma"), 5.8e7);
    EXPECT_DOUBLE_EQ(parse_quantity("35 µm", kinds::length, "--foil"), 35e-6);
    EXPECT_DOUBLE_EQ(parse_quantity("180°", kinds::angle, "--phi"), constants::pi);
    EXPECT_NEAR(parse_quantity("14 dBm", kinds::power, "--power"), 25.1188643e-3, 1e-9);
}

TEST(Units, OptionsSayWhatIsWrong) {
    EXPECT_EQ(message_of("fast", kinds::frequency),
              "--from must be a frequency, but is 'fast'|write it as '868.3 MHz'");
    EXPECT_EQ(message_of("nan", kinds::frequency), "--from must be a frequency, but is 'nan'|write it as '868.3 MHz'");
    EXPECT_EQ(message_of("1 mm", kinds::frequency),
              "--from must be a frequency, but '1 mm' is a length|write it as '868.3 MHz'");
    EXPECT_EQ(message_of("1 ghz", kinds::frequency), "unknown unit 'ghz' in --from '1 ghz'|did you mean 'GHz'?");
    EXPECT_EQ(message_of("", kinds::frequency), "--from must be a frequency, but is ''|write it as '868.3 MHz'");
}

// Dimensions of the SI [SIBrochure, table 4]: ohm times siemens, henry per ohm, ohm times farad, joule per second.
TEST(Units, KindsAreConsistent) {
    const Dimension conductance = find_unit("S")->dimension;
    EXPECT_TRUE((kinds::resistance.dimension * conductance).none());
    EXPECT_EQ(kinds::inductance.dimension / kinds::resistance.dimension, kinds::time.dimension);
    EXPECT_EQ(kinds::resistance.dimension * kinds::capacitance.dimension, kinds::time.dimension);
    EXPECT_EQ(kinds::conductivity.dimension * kinds::length.dimension, conductance);
    EXPECT_EQ(power(kinds::frequency.dimension, -1), kinds::time.dimension);
}

TEST(Units, EverySymbolIsFound) {
    for (const std::string& symbol : unit_symbols()) {
        ASSERT_TRUE(find_unit(symbol)) << symbol;
        EXPECT_GT(find_unit(symbol)->scale, 0) << symbol;
    }
    EXPECT_FALSE(find_unit("furlong"));
    EXPECT_FALSE(find_unit(""));
}

TEST(Units, ShownWithFittingUnit) {
    EXPECT_EQ(to_text(8e-3, kinds::length), "8 mm");
    EXPECT_EQ(to_text(-8e-3, kinds::length), "-8 mm");
    EXPECT_EQ(to_text(0.035e-3, kinds::length), "0.035 mm");
    EXPECT_EQ(to_text(1.5e-6, kinds::length), "1.5 um");
    EXPECT_EQ(to_text(0, kinds::length), "0 mm");
    EXPECT_EQ(to_text(868.3e6, kinds::frequency), "868.3 MHz");
    EXPECT_EQ(to_text(1e9, kinds::frequency), "1 GHz");
    EXPECT_EQ(to_text(constants::pi / 12, kinds::angle), "15 deg");
    EXPECT_EQ(to_text(0.4e-12, kinds::capacitance), "400 fF");
    EXPECT_EQ(to_text(0, kinds::inductance), "0 H");
    EXPECT_EQ(to_text(0.015, kinds::fraction), "1.5 %");
    EXPECT_EQ(to_text(2e6, kinds::number), "2000000");
    EXPECT_EQ(to_text(0.015, kinds::number), "0.015");
    EXPECT_EQ(to_text(3e8, Dimension{1, 0, -1, 0, 0}), "3e+08 m s^-1");
}

TEST(Units, KindsHaveNames) {
    EXPECT_EQ(kind_with_article(kinds::inductance.dimension), "an inductance");
    EXPECT_EQ(kind_with_article(power(kinds::length.dimension, 2)), "an area");
    EXPECT_EQ(kind_with_article(Dimension{}), "a number");
    EXPECT_EQ(kind_with_article(power(kinds::length.dimension, 5)), "a quantity in m^5");
    EXPECT_EQ(kind_with_article(Quantity{0.1, {}, true}), "a ratio");
}

}  // namespace
}  // namespace annulet
