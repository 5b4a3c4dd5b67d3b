#include <annulet/io/sweep_result.hpp>

#include <gtest/gtest.h>

namespace annulet {
namespace {

TEST(Engineering, ChoosesThePrefixAfterRounding) {
    EXPECT_EQ(engineering(868.3e6, "Hz"), "868.3 MHz");
    EXPECT_EQ(engineering(999.96e6, "Hz"), "1 GHz");
    EXPECT_EQ(engineering(999.94e6, "Hz"), "999.9 MHz");
    EXPECT_EQ(engineering(-0.0123, "V"), "-12.3 mV");
    EXPECT_EQ(engineering(0, "Hz"), "0 Hz");
    EXPECT_EQ(engineering(1, "ohm"), "1 ohm");
    EXPECT_EQ(engineering(1000, "ohm"), "1 kohm");
    EXPECT_EQ(engineering(1e-15, "F"), "0.001 pF");
}

}  // namespace
}  // namespace annulet
