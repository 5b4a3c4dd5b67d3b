// Parameters, and their overriding from outside the file.
#include "fault_case.hpp"

#include <gtest/gtest.h>

namespace annulet {
namespace {

const std::string ring = R"~(
[parameters]
radius = 54.9
width = "8 mm"
f0 = "868.3 MHz"
quarter = "c/(4*f0)"
[[metal]]
name = "band"
plane = 0
ring = { center = [0, 0], radius = "radius", width = "width" }
)~";

Ring with(const std::map<std::string, std::string>& set) {
    return std::get<Ring>(evaluate(read_drawing(ring, "m.toml"), set).metals.at(0).shape);
}

TEST(Parameters, AsWritten) {
    const Model model = evaluate(read_drawing(ring, "m.toml"));
    EXPECT_DOUBLE_EQ(model.parameters_si.at("radius"), 54.9);
    EXPECT_DOUBLE_EQ(model.parameters_si.at("width"), 8e-3);
    EXPECT_DOUBLE_EQ(model.parameters_si.at("quarter"), 299792458.0 / (4 * 868.3e6));
    EXPECT_EQ(read_drawing(ring, "m.toml").parameter_names(),
              (std::vector<std::string>{"f0", "quarter", "radius", "width"}));
}

TEST(Parameters, OverridesKeepTheWrittenUnit) {
    EXPECT_DOUBLE_EQ(with({{"radius", "50"}}).radius_m, 50e-3);
    EXPECT_DOUBLE_EQ(with({{"radius", "5 cm"}}).radius_m, 50e-3);
    EXPECT_DOUBLE_EQ(with({{"width", "6"}}).width_m, 6e-3);
    EXPECT_DOUBLE_EQ(with({{"width", "radius/10"}}).width_m, 5.49e-3);
    const Model model = evaluate(read_drawing(ring, "m.toml"), {{"f0", "433"}});
    EXPECT_DOUBLE_EQ(model.parameters_si.at("f0"), 433e6);
    EXPECT_DOUBLE_EQ(model.parameters_si.at("quarter"), 299792458.0 / (4 * 433e6));
}

TEST(Parameters, LengthsFollowTheUnitOfTheFile) {
    const Model model = evaluate(read_drawing("unit = \"inch\"\n" + ring, "m.toml"));
    EXPECT_DOUBLE_EQ(std::get<Ring>(model.metals.at(0).shape).radius_m, 54.9 * 25.4e-3);
    EXPECT_DOUBLE_EQ(std::get<Ring>(model.metals.at(0).shape).width_m, 8e-3);
}

TEST(Parameters, FaultyOverrides) {
    EXPECT_EQ(faults_of(ring, {{"radus", "5"}}),
              "m.toml: error: --set radus=5: the model has no parameter 'radus'\nhelp: did you mean 'radius'?\n");
    EXPECT_EQ(faults_of(ring, {{"width", "3 MHz"}}),
              "m.toml: error: --set width=3 MHz: parameter 'width' is a length, but this is a frequency\n");
    EXPECT_EQ(faults_of(ring, {{"width", "3 furlong"}}),
              "m.toml: error: --set width=3 furlong: unknown unit 'furlong'\n");
    EXPECT_EQ(faults_of(ring, {{"width", "2*width"}}),
              "m.toml: error: --set width=2*width: parameter 'width' depends on itself: width -> width\n");
    EXPECT_EQ(
        faults_of(ring, {}, {"bend"}),
        "m.toml: error: cannot leave out 'bend': the model has no metal, via, wire, laminate or lumped part of this "
        "name\nhelp: did you mean 'band'?\n");
}

TEST(Parameters, AFaultyParameterIsReportedOnce) {
    const std::string text =
        "[parameters]\na = \"1 foo\"\nb = \"2*a\"\n[[metal]]\nname = \"band\"\nplane = \"a\"\n"
        "disc = { center = [\"a\", \"b\"], radius = \"a + b\" }\n";
    EXPECT_EQ(faults_of(text),
              "m.toml:2:8: error: parameter 'a': unknown unit 'foo'\n    a = \"1 foo\"\n           ^\n");
}

TEST(Parameters, PlaceInTextsOfOtherForms) {
    // Verbatim text: the very character. Escapes and several lines: the value.
    EXPECT_EQ(faults_of("[parameters]\nx = 'µ'\n").substr(0, 16), "m.toml:2:6: erro");
    EXPECT_EQ(faults_of("[parameters]\nx = '1 µm + 2 foo'\n").substr(0, 17), "m.toml:2:15: erro");
    EXPECT_EQ(faults_of("[parameters]\nx = \"1 \\u006Dm + 2 foo\"\n").substr(0, 16), "m.toml:2:5: erro");
    EXPECT_EQ(faults_of("[parameters]\nx = '''1 mm +\n2 foo'''\n").substr(0, 16), "m.toml:2:5: erro");
}

TEST(Parameters, OmittedItemsAreLeftOut) {
    const std::string text = ring + "[[metal]]\nname = \"patch\"\nplane = 0\ndisc = { center = [90, 0], radius = 5 }\n";
    EXPECT_EQ(evaluate(read_drawing(text, "m.toml")).metals.size(), 2U);
    const Model without = evaluate(read_drawing(text, "m.toml"), {}, {"patch"});
    ASSERT_EQ(without.metals.size(), 1U);
    EXPECT_EQ(without.metals[0].name, "band");
}

}  // namespace
}  // namespace annulet
