#include <annulet/core/diagnostics.hpp>
#include <annulet/study/solve.hpp>

#include <gtest/gtest.h>

namespace annulet {
namespace {

using Frequencies = std::vector<double>;

SweepRange range(double from_hz, double to_hz, int points) {
    return {from_hz, to_hz, points, {}};
}

std::string refusal(const SweepRange& asked, const FrequencyChoice& choice = {}) {
    try {
        sweep_frequencies(asked, choice);
    } catch (const InputError& error) {
        return error.faults().front().message;
    }
    return "accepted";
}

TEST(SweepFrequencies, AreEvenlySpacedWithBothEnds) {
    EXPECT_EQ(sweep_frequencies(range(1e8, 3e8, 5)), (Frequencies{1e8, 1.5e8, 2e8, 2.5e8, 3e8}));
    EXPECT_EQ(sweep_frequencies(range(1e8, 1e8, 1)), Frequencies{1e8});
    EXPECT_EQ(sweep_frequencies(range(1e8, 1e8, 7)), Frequencies{1e8});
}

TEST(SweepFrequencies, ChoiceTakesThePlaceOfTheModelPieceByPiece) {
    FrequencyChoice choice;
    choice.to_hz = 2e8;
    choice.points = 3;
    EXPECT_EQ(sweep_frequencies(range(1e8, 3e8, 5), choice), (Frequencies{1e8, 1.5e8, 2e8}));
}

TEST(SweepFrequencies, SingleOnesAreSortedWithoutRepetition) {
    SweepRange at = range(1e8, 3e8, 5);
    at.at_hz = {9e8, 8e8, 9e8};
    EXPECT_EQ(sweep_frequencies(at), (Frequencies{8e8, 9e8}));
    FrequencyChoice choice;
    choice.at_hz = {5e8};
    EXPECT_EQ(sweep_frequencies(at, choice), Frequencies{5e8});
}

TEST(SweepFrequencies, RefusalsSayWhy) {
    EXPECT_EQ(refusal({}), "no frequencies: the model has no [sweep]");
    EXPECT_EQ(refusal(range(0, 1e9, 5)), "the sweep starts at 0 MHz: frequencies must be above zero");
    EXPECT_EQ(refusal(range(2e9, 1e9, 5)), "the sweep ends at 1000 MHz, below its start at 2000 MHz");
    EXPECT_EQ(refusal(range(1e9, 2e9, 1)), "one point cannot sweep a range");
    EXPECT_EQ(refusal(range(1e9, 2e9, 2'000'000)), "a sweep of 2000000 points: between 1 and 1000000 are possible");
}

}  // namespace
}  // namespace annulet
