#include <gtest/gtest.h>
#include <annulet/study/prove.hpp>

#include "study/prove_cases.hpp"
#include "study/prove_references.hpp"
#include "support/reference_values.hpp"
#include "support/thin_loop.hpp"

namespace annulet {
namespace {

void expect_all_pass(const std::vector<ProveTask>& tasks) {
    for (const auto& task : tasks)
        for (const auto& c : task())
            EXPECT_TRUE(c.pass()) << c.name << ", " << c.quantity << ": " << c.computed << " against " << c.reference
                                  << ", error " << c.error();
}

TEST(Prove, Dipoles) {
    expect_all_pass(dipole_tasks());
}
TEST(Prove, Loops) {
    expect_all_pass(loop_tasks());
}
TEST(Prove, CoupledWires) {
    expect_all_pass(coupling_tasks());
}

// One test each: they take a second or two.
class ProveFlatMetal : public testing::TestWithParam<std::size_t> {};
TEST_P(ProveFlatMetal, Passes) {
    expect_all_pass({flat_metal_tasks().at(GetParam())});
}
INSTANTIATE_TEST_SUITE_P(All, ProveFlatMetal, testing::Range(std::size_t{0}, flat_metal_tasks().size()));

// A table whose tolerances were widened until it passes proves nothing: a hundredth of them must fail.
TEST(Prove, ImpossibleToleranceFails) {
    int failed = 0;
    for (const auto& task : dipole_tasks())
        for (auto c : task()) {
            c.tolerance /= 100;
            failed += c.pass() ? 0 : 1;
        }
    EXPECT_GT(failed, 10);
}

TEST(Prove, TablesAreThoseOfTheValues) {
    const auto values = test::reference_values("dipole_impedance");
    ASSERT_EQ(references::dipoles().size(), values.size());
    for (std::size_t i = 0; i < values.size(); ++i) {
        EXPECT_EQ(references::dipoles()[i].impedance, values[i].complex("Z_gap_2a"));
        EXPECT_EQ(references::dipoles()[i].radius, values[i].geometry("a_over_lambda"));
    }
    const auto loops = test::reference_values("loop_impedance");
    ASSERT_EQ(references::loops().size(), loops.size());
    for (std::size_t i = 0; i < loops.size(); ++i)
        EXPECT_EQ(references::loops()[i].impedance, loops[i].complex("Z_gap2a"));
}

// The two numbers of the strip rings in prove_flat.cpp, from the series itself [Storer1956, Wu1962].
TEST(Prove, StripRingsAreThoseOfTheSeries) {
    for (const auto& [width, hz, ohm] : {std::tuple{0.002, 945.05e6, 143.75}, {0.008, 1000.78e6, 159.26}}) {
        const test::ThinLoop loop{0.054, width / 4, 2 * 3.14159265358979 * 0.054 / 60};
        const double f = test::loop_resonance_hz(loop);
        EXPECT_NEAR(f / hz, 1, 1e-4);
        EXPECT_NEAR(test::loop_impedance(loop, f).real() / ohm, 1, 1e-3);
    }
}

TEST(Prove, ShownCasesAreNotJudged) {
    ProveCase c = real_case("x", "y", 1, 2, 0.1, "z");
    EXPECT_FALSE(c.pass());
    EXPECT_TRUE(shown_only(c, "because").pass());
    ProveReport report;
    report.cases = {c, shown_only(c, "because")};
    EXPECT_EQ(report.judged(), 1);
    EXPECT_FALSE(report.pass());
}

}  // namespace
}  // namespace annulet
