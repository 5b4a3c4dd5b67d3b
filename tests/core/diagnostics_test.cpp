#include <annulet/core/diagnostics.hpp>

#include <gtest/gtest.h>

namespace annulet {
namespace {

TEST(Diagnostics, ShowsPlaceLineAndRemedy) {
    const Diagnostic fault{Severity::error, {2, 9}, "width must be greater than 0 mm, but is -8 mm", "turn the sign"};
    EXPECT_EQ(format(fault, "weir.toml", "unit = \"mm\"\nwidth = -8\n"),
              "weir.toml:2:9: error: width must be greater than 0 mm, but is -8 mm\n"
              "    width = -8\n"
              "            ^\n"
              "help: turn the sign\n");
}

TEST(Diagnostics, WithoutPlaceOrRemedy) {
    EXPECT_EQ(format({Severity::error, {}, "no parameter 'a'", ""}, "weir.toml", "x = 1\n"),
              "weir.toml: error: no parameter 'a'\n");
    EXPECT_EQ(format({Severity::caution, {1, 0}, "coarse", ""}, "weir.toml", "x = 1\n"),
              "weir.toml:1: caution: coarse\n");
}

TEST(Diagnostics, CaretStandsUnderCharactersNotBytes) {
    EXPECT_EQ(format({Severity::error, {1, 8}, "m", ""}, "f", "a = \"µ\"x"),
              "f:1:8: error: m\n    a = \"µ\"x\n           ^\n");
    EXPECT_EQ(format({Severity::error, {1, 3}, "m", ""}, "f", "\ta = 1"), "f:1:3: error: m\n    \ta = 1\n    \t ^\n");
}

TEST(Diagnostics, CaretMayStandBehindTheLine) {
    EXPECT_EQ(format({Severity::error, {1, 9}, "m", ""}, "f", "ab\r\ncd"), "f:1:9: error: m\n    ab\n      ^\n");
    EXPECT_EQ(format({Severity::error, {7, 2}, "m", ""}, "f", "ab\n"), "f:7:2: error: m\n    \n    ^\n");
}

TEST(Diagnostics, ControlCharactersDoNotReachTheTerminal) {
    EXPECT_EQ(format({Severity::error, {1, 1}, "bad \x1b[2J", ""}, "f", "\x1b[2J\n"),
              "f:1:1: error: bad ?[2J\n    ?[2J\n    ^\n");
}

TEST(Diagnostics, LongLinesAreCutAroundTheCaret) {
    std::string line(5000, 'a');
    line[3000] = 'X';
    const std::string shown = format({Severity::error, {1, 3001}, "m", ""}, "f", line);
    EXPECT_LT(shown.size(), 400U);
    const auto caret = shown.find('^'), mark = shown.find('X');
    ASSERT_NE(caret, std::string::npos);
    ASSERT_NE(mark, std::string::npos);
    const auto column = [&](std::size_t at) { return at - shown.rfind('\n', at); };
    EXPECT_EQ(column(caret), column(mark));
}

TEST(Diagnostics, InputErrorSortsItsFaults) {
    const InputError error({{Severity::error, {9, 1}, "late", ""}, {Severity::error, {2, 5}, "early", ""}});
    EXPECT_EQ(error.faults().at(0).message, "early");
    EXPECT_STREQ(error.what(), "early (and 1 more)");
    EXPECT_STREQ(InputError({{Severity::error, {}, "only", ""}}).what(), "only");
}

TEST(Diagnostics, NearestWord) {
    const std::vector<std::string> known{"sweep", "pattern", "harmonics", "match", "radius"};
    EXPECT_EQ(nearest("sweeep", known), "sweep");
    EXPECT_EQ(nearest("sewep", known), "sweep");
    EXPECT_EQ(nearest("harmonic", known), "harmonics");
    EXPECT_EQ(nearest("radus", known), "radius");
    EXPECT_EQ(nearest("elephant", known), "");
    EXPECT_EQ(nearest("", known), "");
    EXPECT_EQ(nearest(std::string(100000, 'a'), known), "");
    EXPECT_EQ(nearest("Mhz", {"kHz", "MHz", "mm"}), "MHz");
}

}  // namespace
}  // namespace annulet
