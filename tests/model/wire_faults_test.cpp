// Faults of wires.
#include "fault_case.hpp"

namespace annulet {
namespace {

class WireFaults : public testing::TestWithParam<FaultCase> {};

TEST_P(WireFaults, SaysExactly) {
    EXPECT_EQ(faults_of(GetParam().text), GetParam().expected);
}

// clang-format off
const FaultCase cases[] = {
{"WirePathOfOne",
R"([[wire]]
name = "lead"
radius = "0.5 mm"
path = [[0, 0, 0]]
)",
R"(m.toml:4:8: error: the path of wire 'lead' has fewer than two points
    path = [[0, 0, 0]]
           ^
help: a wire runs from one point at least to another, or along an arc
)"},
{"WireInPlane",
R"([[wire]]
name = "lead"
radius = "0.5 mm"
path = [[0, 0], [0, 0, 20]]
)",
R"(m.toml:4:9: error: point 1 of wire 'lead' lies in space and takes three coordinates, but has two
    path = [[0, 0], [0, 0, 20]]
            ^
)"},
{"WireCoincides",
R"([[wire]]
name = "lead"
radius = "0.5 mm"
path = [[0, 0, 5], [0, 0, 5]]
)",
R"(m.toml:4:20: error: points 1 and 2 of wire 'lead' coincide at (0, 0, 5) mm
    path = [[0, 0, 5], [0, 0, 5]]
                       ^
help: leave one of them out
)"},
{"WireNoShape",
R"([[wire]]
name = "lead"
radius = 0
)",
R"(m.toml:1:1: error: wire 'lead' has no shape
    [[wire]]
    ^
help: add one of path, circle, helix
m.toml:3:10: error: 'radius' of wire 'lead' must be greater than 0 mm, but is 0 mm
    radius = 0
             ^
)"},
{"WireBeginsWithArc",
R"([[wire]]
name = "lead"
radius = 0.5
path = [{ arc = { center = [0, 0, 5], sweep = 90 } }, [0, 0, 0]]
)",
R"(m.toml:4:9: error: the path of wire 'lead' begins with an arc
    path = [{ arc = { center = [0, 0, 5], sweep = 90 } }, [0, 0, 0]]
            ^
help: begin with the point where the arc starts
)"},
{"WireArcSweep",
R"([[wire]]
name = "lead"
radius = 0.5
path = [[5, 0, 0], { arc = { center = [0, 0, 0], sweep = 0 } }]
)",
R"(m.toml:4:58: error: 'sweep' of the arc at point 2 of wire 'lead' is zero
    path = [[5, 0, 0], { arc = { center = [0, 0, 0], sweep = 0 } }]
                                                             ^
)"},
{"WireArcCenter",
R"([[wire]]
name = "lead"
radius = 0.5
path = [[5, 0, 0], { arc = { center = [5, 0, 0], sweep = 90 } }]
)",
R"(m.toml:4:39: error: the arc at point 2 of wire 'lead' has its center on its starting point (5, 0, 0) mm
    path = [[5, 0, 0], { arc = { center = [5, 0, 0], sweep = 90 } }]
                                          ^
)"},
{"WireArcOutOfPlane",
R"([[wire]]
name = "lead"
radius = 0.5
path = [[5, 0, 2], { arc = { center = [0, 0, 0], sweep = 90 } }]
)",
R"(m.toml:4:28: error: the arc at point 2 of wire 'lead' starts at (5, 0, 2) mm, 2 mm out of the plane of its center and normal
    path = [[5, 0, 2], { arc = { center = [0, 0, 0], sweep = 90 } }]
                               ^
help: move the center, or turn the normal square to the line from the center to the start
)"},
{"WireNormal",
R"([[wire]]
name = "loop"
radius = 0.5
circle = { center = [0, 0, 0], radius = 50, normal = [0, 0, 0] }
)",
R"(m.toml:4:54: error: 'normal' of the circle of wire 'loop' has no length
    circle = { center = [0, 0, 0], radius = 50, normal = [0, 0, 0] }
                                                         ^
help: write [0, 0, 1]
)"},
{"WireNormalShort",
R"([[wire]]
name = "loop"
radius = 0.5
circle = { center = [0, 0, 0], radius = 50, normal = [0, 1] }
)",
R"(m.toml:4:54: error: 'normal' of the circle of wire 'loop' must be a direction of three numbers
    circle = { center = [0, 0, 0], radius = 50, normal = [0, 1] }
                                                         ^
help: write [0, 0, 1]
)"},
{"WireCircleThick",
R"([[wire]]
name = "loop"
radius = 5
circle = { center = [0, 0, 0], radius = 4 }
)",
R"(m.toml:4:41: error: 'radius' of the circle of wire 'loop' must be greater than the radius of the wire, 5 mm, but is 4 mm
    circle = { center = [0, 0, 0], radius = 4 }
                                            ^
)"},
{"HelixTouches",
R"([[wire]]
name = "coil"
radius = 0.5
helix = { center = [0, 0, 0], radius = 4, pitch = 0.8, turns = 5 }
)",
R"(m.toml:4:51: error: 'pitch' of the helix of wire 'coil' must exceed the diameter of the wire, 1 mm, or its turns touch, but is 0.8 mm
    helix = { center = [0, 0, 0], radius = 4, pitch = 0.8, turns = 5 }
                                                      ^
)"},
};
// clang-format on

INSTANTIATE_TEST_SUITE_P(Each, WireFaults, testing::ValuesIn(cases), case_name);

}  // namespace
}  // namespace annulet
