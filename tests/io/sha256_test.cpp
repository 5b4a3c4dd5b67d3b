// Values: FIPS PUB 180-4 examples ("abc" and the 448-bit message), as published with the standard.
#include <annulet/io/sha256.hpp>

#include <gtest/gtest.h>

namespace annulet {
namespace {

TEST(Sha256, AgreesWithThePublishedExamples) {
    EXPECT_EQ(sha256("abc"), "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad");
    EXPECT_EQ(sha256("abcdbcdecdefdefgefghfghighijhijkijkljklmklmnlmnomnopnopq"),
              "248d6a61d20638b8e5c026930c3e6039a33ce45964ff2167f6ecedd419db06c1");
}

}  // namespace
}  // namespace annulet
