// Nothing that can be written makes the reader crash, hang or take memory without bound.
#include "fault_case.hpp"

#include <fmt/format.h>
#include <gtest/gtest.h>

#include <iostream>
#include <random>

namespace annulet {
namespace {

std::string first_line(const std::string& text) {
    return text.substr(0, text.find('\n'));
}

TEST(Limits, LargeFile) {
    EXPECT_EQ(faults_of(std::string(4'000'001, '#')),
              "m.toml: error: the file has 4000001 bytes, more than 4000000\nhelp: is this a model file?\n");
}

TEST(Limits, DeeplyNestedLists) {
    const std::string shown = faults_of(fmt::format("a = {:[<100000}", ""));
    EXPECT_NE(shown.find("not valid TOML"), std::string::npos) << first_line(shown);
}

TEST(Limits, LongChainOfParameters) {
    std::string text = "[parameters]\na0 = 1\n";
    for (int i = 1; i < 5000; ++i) text += fmt::format("a{} = \"a{} + 1\"\n", i, i - 1);
    EXPECT_NE(faults_of(text).find("the expression nests more than 200 deep"), std::string::npos);
}

TEST(Limits, LongLists) {
    std::string points;
    for (int i = 0; i < 10'001; ++i) points += fmt::format("[{}, 0],", i);
    const std::string head = "[[metal]]\nname = \"band\"\nplane = 0\n";
    EXPECT_EQ(first_line(faults_of(head + "polygon = { points = [" + points + "] }\n")),
              "m.toml:4:22: error: 'points' of the polygon of metal 'band' has 10001 entries, more than 10000");
    EXPECT_EQ(first_line(faults_of(head + "polygon = [" + points + "]\n")),
              "m.toml:4:11: error: the polygon of metal 'band' has 10001 corners, more than 10000");
}

TEST(Limits, ManyItems) {
    std::string text;
    for (int i = 0; i < 10'001; ++i) text += "[[via]]\n";
    EXPECT_EQ(first_line(faults_of(text)), "m.toml:1:1: error: the model has 10001 entries of 'via', more than 10000");
}

TEST(Limits, ManyFaults) {
    std::string text;
    for (int i = 0; i < 500; ++i) text += "[[via]]\n";
    const std::string shown = faults_of(text);
    EXPECT_NE(shown.find("there are more faults, which are not shown"), std::string::npos);
    EXPECT_LT(shown.size(), 20'000U);
}

const char* const seed_text = R"~(title = "fuzz"
unit = "mm"
[parameters]
radius = 54.9
width = "8 mm"
f0 = "868.3 MHz"
gap = "min(width/4, 1.2 mm)"
[[laminate]]
name = "board"
top = 0
thickness = "1.6 mm"
permittivity = [["100 MHz", 4.4], ["3 GHz", 4.25]]
outline = { around = { metal = "band", margin = "3 mm" } }
openings = [ { sector = { center = [0, 0], outer_radius = 5, sweep = 90 } } ]
[[laminate]]
name = "lid"
top = "gap + 5"
thickness = 1
permittivity = 2.3
outline = { polygon = { points = [[0, 0], ["radius", 0], [0, "radius"]] } }
[[metal]]
name = "band"
on = "board.top"
ring = { center = [0, 0], radius = "radius", width = "width" }
[[metal]]
name = "lead"
on = "board.bottom"
path = { points = [[0, 0], [10, 0], { arc = { center = [10, 5], sweep = "90 deg" } }], width = [2, 1] }
[[wire]]
name = "whip"
radius = 0.5
helix = { center = [0, 0, 0], radius = 4, pitch = 2, turns = 5 }
[[port]]
name = "feed"
on = "board.top"
bridge = [["radius", "-gap/2"], ["radius", "gap/2"]]
width = "c/(1000*f0)"
[[lumped]]
name = "trim"
wire = "whip"
gap = 1
capacitance = "0.4 pF"
[[feature]]
name = "trim"
off = { set = { gap = 1.0 }, omit = ["trim"] }
[goal]
band = ["863 MHz", "870 MHz"]
[sweep]
from = "100 MHz"
to = "3 GHz"
)~";

std::string mutated(std::string text, std::mt19937& random) {
    static const std::string bits[] = {"nan", "inf", "-", "0",    "1e308", "\"",     "[",         "]",    "{",  "}",
                                       "(",   ")",   "^", "/",    "%",     "mm",     "GHz",       "'",    "\\", "\n",
                                       "=",   ".",   ",", "\xff", "µ",     "radius", "[[metal]]", "sqrt("};
    const auto pick = [&](std::size_t n) { return std::uniform_int_distribution<std::size_t>(0, n - 1)(random); };
    for (std::size_t n = 1 + pick(4); n > 0; --n) {
        const std::size_t at = pick(text.size());
        switch (pick(5)) {
            case 0:
                text.erase(at, 1 + pick(5));
                break;
            case 1:
                text.insert(at, bits[pick(std::size(bits))]);
                break;
            case 2:
                text[at] = static_cast<char>(pick(256));
                break;
            case 3:
                text.insert(pick(text.size()), text.substr(at, pick(60)));
                break;
            default:
                std::swap(text[at], text[pick(text.size())]);
                break;
        }
        if (text.empty()) text.push_back(' ');
    }
    return text;
}

TEST(Limits, MutatedTextsGiveAModelOrFaults) {
    const unsigned seed = 20240917;
    std::cout << "seed " << seed << '\n';
    ASSERT_EQ(faults_of(seed_text), "");
    std::mt19937 random(seed);
    int good = 0, bad = 0;
    for (int i = 0; i < 3000; ++i) {
        const std::string text = mutated(seed_text, random);
        try {
            evaluate(read_drawing(text, "m.toml"));
            ++good;
        } catch (const InputError& error) {
            ++bad;
            for (const Diagnostic& fault : error.faults()) EXPECT_FALSE(format(fault, "m.toml", text).empty());
        } catch (const std::exception& other) {
            FAIL() << other.what() << "\n" << text;
        }
    }
    EXPECT_GT(good, 10);
    EXPECT_GT(bad, 1000);
}

}  // namespace
}  // namespace annulet
