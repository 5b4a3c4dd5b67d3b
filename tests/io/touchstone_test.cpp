// Format facts: "Touchstone File Format Specification, Version 2.0", IBIS Open Forum, 2009: option line, number
// formats, the 21_12 order of two ports, [keywords]; defaults GHz, S, MA, R 50.
#include <annulet/core/diagnostics.hpp>
#include <annulet/io/touchstone.hpp>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <random>

namespace annulet {
namespace {

using Complex = std::complex<double>;
using Eigen::MatrixXcd;

TouchstoneData random_data(int ports, const std::vector<double>& reference_ohm) {
    std::mt19937 generator(20240501);
    std::uniform_real_distribution<double> uniform(-1, 1);
    TouchstoneData data;
    data.reference_ohm = reference_ohm;
    data.comments = {"annulet test"};
    for (int i = 0; i < 5; ++i) {
        data.frequency_hz.push_back(868.3e6 + 0.1 * i);
        data.scattering.push_back(
            MatrixXcd::NullaryExpr(ports, ports, [&] { return Complex(uniform(generator), uniform(generator)); }));
    }
    return data;
}

void expect_equal(const TouchstoneData& a, const TouchstoneData& b) {
    EXPECT_EQ(a.frequency_hz, b.frequency_hz);
    EXPECT_EQ(a.reference_ohm, b.reference_ohm);
    ASSERT_EQ(a.scattering.size(), b.scattering.size());
    for (std::size_t i = 0; i < a.scattering.size(); ++i)
        EXPECT_LT((a.scattering[i] - b.scattering[i]).cwiseAbs().maxCoeff(), 1e-12);
}

class RoundTrip : public testing::TestWithParam<std::vector<double>> {};

TEST_P(RoundTrip, KeepsTheData) {
    const int ports = static_cast<int>(GetParam().size());
    const auto data = random_data(ports, GetParam());
    const auto back = read_touchstone(touchstone_text(data), ports);
    expect_equal(data, back);
    EXPECT_EQ(back.comments, data.comments);
}

INSTANTIATE_TEST_SUITE_P(Ports, RoundTrip,
                         testing::Values(std::vector<double>{50}, std::vector<double>{75}, std::vector<double>{50, 50},
                                         std::vector<double>{50, 75}, std::vector<double>{50, 75, 12.5},
                                         std::vector<double>(5, 50.0), std::vector<double>(9, 100.0)));

TEST(TouchstoneText, OnePortIsVersionOne) {
    TouchstoneData data{{1e9}, {MatrixXcd::Constant(1, 1, Complex(0.5, -0.25))}, {50}, {"annulet"}};
    EXPECT_EQ(touchstone_text(data), "! annulet\n# Hz S RI R 50\n1000000000  5.000000000000e-01 -2.500000000000e-01\n");
}

TEST(TouchstoneText, TwoPortsStandColumnByColumn) {
    MatrixXcd s{{Complex(11), Complex(12)}, {Complex(21), Complex(22)}};
    const auto text = touchstone_text({{1e9}, {s}, {50, 50}, {}});
    EXPECT_LT(text.find("2.1"), text.find("1.2000"));
}

TEST(TouchstoneText, ThreePortsAreVersionTwo) {
    const auto text = touchstone_text(random_data(3, {50, 50, 50}));
    EXPECT_THAT(text, testing::HasSubstr("[Version] 2.0\n# Hz S RI\n[Number of Ports] 3\n"));
    EXPECT_TRUE(text.ends_with("[End]\n"));
}

TEST(TouchstoneText, NoLineHasMoreThanFourPairs) {
    const auto text = touchstone_text(random_data(9, std::vector<double>(9, 50.0)));
    std::size_t longest = 0, start = 0;
    for (auto end = text.find('\n'); end != std::string::npos; start = end + 1, end = text.find('\n', start))
        longest = std::max(longest, end - start);
    EXPECT_LE(longest, 20u + 8 * 20);
}

TEST(TouchstoneText, CommentsStayOnOneLineInAscii) {
    auto data = random_data(1, {50});
    data.comments = {"Fl\xC3\xBCgel\n# GHz Z MA\x1B[2J"};
    EXPECT_THAT(touchstone_text(data), testing::StartsWith("! Fl?gel # GHz Z MA?[2J\n# Hz S RI R 50\n"));
}

TEST(ReadTouchstone, DefaultsUnitsAndFormats) {
    const auto defaults = read_touchstone("#\n1 0.5 90\n", 1);
    EXPECT_EQ(defaults.frequency_hz, std::vector<double>{1e9});
    EXPECT_EQ(defaults.reference_ohm, std::vector<double>{50});
    EXPECT_LT(std::abs(defaults.scattering[0](0, 0) - Complex(0, 0.5)), 1e-15);
    const auto decibels = read_touchstone("! c\n# mhz s db r 75 ! trailing\n868.3 -20 180\n", 1);
    EXPECT_NEAR(decibels.frequency_hz[0], 868.3e6, 1e-6);
    EXPECT_LT(std::abs(decibels.scattering[0](0, 0) - Complex(-0.1, 0)), 1e-15);
    EXPECT_EQ(decibels.reference_ohm[0], 75);
}

TEST(ReadTouchstone, OrderOfTwoPortsInVersionTwo) {
    const std::string head = "[Version] 2.0\n# Hz S RI\n[Number of Ports] 2\n[Two-Port Data Order] ";
    const std::string tail = "\n[Number of Frequencies] 1\n[Network Data]\n1 11 0 12 0 21 0 22 0\n[End]\n";
    EXPECT_EQ(read_touchstone(head + "12_21" + tail, 0).scattering[0](0, 1), Complex(12));
    EXPECT_EQ(read_touchstone(head + "21_12" + tail, 0).scattering[0](1, 0), Complex(12));
}

TEST(ReadTouchstone, TriangularMatricesAndReferencesOnTheNextLine) {
    const std::string head = "[Version] 2.0\n# Hz S RI\n[Number of Ports] 3\n[Reference]\n50 75\n100\n[Matrix Format] ";
    const std::string tail = "\n[Network Data]\n1 1 0\n2 0 3 0\n4 0 5 0 6 0\n[End]\n";
    const auto lower = read_touchstone(head + "Lower" + tail, 0);
    EXPECT_EQ(lower.reference_ohm, (std::vector<double>{50, 75, 100}));
    EXPECT_EQ(lower.scattering[0](0, 2), Complex(4));
    EXPECT_EQ(lower.scattering[0](2, 1), Complex(5));
    EXPECT_EQ(read_touchstone(head + "Upper" + tail, 0).scattering[0](1, 2), Complex(5));
}

TEST(ReadTouchstone, PassesOverNoiseAndInformation) {
    const auto noisy = read_touchstone("# Hz S RI R 50\n2 1 0 0 0 0 0 1 0\n3 1 0 0 0 0 0 1 0\n1 2 0.5 30 0.4\n", 2);
    EXPECT_EQ(noisy.frequency_hz.size(), 2u);
    const auto informed = read_touchstone(
        "[Version] 2.0\n# Hz S RI\n[Number of Ports] 1\n[Begin Information]\nfree text\n[End Information]\n"
        "[Network Data]\n1 0.5 0\n[Noise Data]\n1 2 3 4 5\n[End]\nanything\n",
        0);
    EXPECT_EQ(informed.frequency_hz.size(), 1u);
}

struct Fault {
    const char *text, *message;
    int ports, line;
};
class TouchstoneFault : public testing::TestWithParam<Fault> {};

TEST_P(TouchstoneFault, NamesPlaceAndReason) {
    try {
        read_touchstone(GetParam().text, GetParam().ports);
        FAIL() << "accepted";
    } catch (const InputError& error) {
        EXPECT_EQ(error.faults().front().message, GetParam().message);
        EXPECT_EQ(error.faults().front().where.line, GetParam().line);
    }
}

INSTANTIATE_TEST_SUITE_P(
    All, TouchstoneFault,
    testing::Values(
        Fault{"", "no option line", 1, 1}, Fault{"1 0.5 0\n", "data before the option line", 1, 1},
        Fault{"# Hz Z RI R 50\n1 0 0\n", "'z' parameters: only S parameters are read", 1, 1},
        Fault{"# Hz S XY R 50\n1 0 0\n", "'xy' is no option", 1, 1},
        Fault{"# Hz S RI R 0\n1 0 0\n", "a reference of 0 ohm is not above zero", 1, 1},
        Fault{"# Hz S RI R 50\n1 0\n", "the data of 1 ports need 3 numbers here, 2 are left", 1, 2},
        Fault{"# Hz S RI R 50\n1 0 zero\n", "'zero' is not a number", 1, 2},
        Fault{"# Hz S RI R 50\n1 0 nan\n", "'nan' is not a finite number", 1, 2},
        Fault{"# Hz S RI R 50\n2 0 0\n1 0 0\n", "the frequency 1 does not ascend", 1, 3},
        Fault{"# Hz S RI R 50 60 70\n2 0 0\n", "3 references for 1 ports", 1, 1},
        Fault{"# Hz S RI R 50\n", "0 ports", 0, 1},
        Fault{"[Version] 2.0\n# Hz S RI\n[Number of Ports] 1\n[Network Data]\n1 0 0\n",
              "the file does not end with [End]", 0, 1},
        Fault{
            "[Version] 2.0\n# Hz S RI\n[Number of Ports] 1\n[Number of Frequencies] 2\n[Network Data]\n1 0 0\n[End]\n",
            "2 frequencies announced, 1 found", 0, 6},
        Fault{"[Version] 2.0\n# Hz S RI\n[Colour] red\n", "unknown keyword [colour]", 0, 3}));

}  // namespace
}  // namespace annulet
