// Faults of ports and lumped parts.
#include "fault_case.hpp"

namespace annulet {
namespace {

class PartsFaults : public testing::TestWithParam<FaultCase> {};

TEST_P(PartsFaults, SaysExactly) {
    EXPECT_EQ(faults_of(GetParam().text), GetParam().expected);
}

// clang-format off
const FaultCase cases[] = {
{"PortNoPlace",
R"([[port]]
name = "feed"
)",
R"(m.toml:1:1: error: port 'feed' has no place
    [[port]]
    ^
help: add one of bridge, across, wire
)"},
{"PortTwoPlaces",
R"([[port]]
name = "feed"
wire = "lead"
bridge = [[0, 0, 0], [0, 1, 0]]
)",
R"(m.toml:4:10: error: port 'feed' has 2 places, 'wire' and 'bridge'
    bridge = [[0, 0, 0], [0, 1, 0]]
             ^
help: keep exactly one of bridge, across, wire
)"},
{"PortNoName",
R"([[port]]
bridge = [[0, 0, 0], [0, 1, 0]]
width = 1
)",
R"(m.toml:1:1: error: port 1 has no 'name'
    [[port]]
    ^
help: add name = "feed"
)"},
{"PortTwice",
R"([[port]]
name = "feed"
bridge = [[0, 0, 0], [0, 1, 0]]
width = 1
[[port]]
name = "feed"
bridge = [[9, 0, 0], [9, 1, 0]]
width = 1
)",
R"(m.toml:5:1: error: port 'feed' has the name of the one in line 1
    [[port]]
    ^
help: give each its own name
)"},
{"PortNoFlatMetal",
R"([[port]]
name = "feed"
bridge = [[0, 0], [0, 1]]
width = 1
)",
R"(m.toml:3:11: error: first point of 'bridge' of port 'feed' has two coordinates, but there is no flat metal
    bridge = [[0, 0], [0, 1]]
              ^
help: give three coordinates
)"},
{"PortAmbiguous",
R"([[metal]]
name = "lower"
plane = 0
disc = { center = [0, 0], radius = 5 }
[[metal]]
name = "upper"
plane = 3
disc = { center = [0, 0], radius = 5 }
[[port]]
name = "feed"
bridge = [[0, 0], [0, 1]]
width = 1
)",
R"(m.toml:11:11: error: first point of 'bridge' of port 'feed' has two coordinates, but metal lies in 2 planes
    bridge = [[0, 0], [0, 1]]
              ^
help: add on = "board.top" to port 'feed', or give three coordinates
)"},
{"PortThreePoints",
R"([[port]]
name = "feed"
bridge = [[0, 0, 0], [0, 1, 0], [0, 2, 0]]
width = 1
)",
R"(m.toml:3:10: error: 'bridge' of port 'feed' must have two points, but has 3
    bridge = [[0, 0, 0], [0, 1, 0], [0, 2, 0]]
             ^
help: write bridge = [[x1, y1], [x2, y2]]
)"},
{"PortNoLength",
R"([[port]]
name = "feed"
bridge = [[3, 1, 0], [3, 1, 0]]
width = 1
)",
R"(m.toml:3:10: error: 'bridge' of port 'feed' has no length: both points are (3, 1) mm
    bridge = [[3, 1, 0], [3, 1, 0]]
             ^
help: a port or part always has a physical length
)"},
{"PortNoWidth",
R"([[port]]
name = "feed"
bridge = [[0, 0, 0], [0, 1, 0]]
gap = 1
at = 0.5
)",
R"(m.toml:1:1: error: port 'feed' has no 'width'
    [[port]]
    ^
help: add width = "8 mm"
m.toml:4:7: error: 'gap' has no meaning on a bridge, whose length is that between its points
    gap = 1
          ^
help: a bridge takes 'width'
m.toml:5:6: error: 'at' has no meaning on a bridge
    at = 0.5
         ^
help: 'at' belongs to 'wire'
)"},
{"AcrossWidth",
R"([[port]]
name = "feed"
across = [[0, 0, 0], [0, 1, 0]]
width = 1
)",
R"(m.toml:1:1: error: port 'feed' has no 'gap'
    [[port]]
    ^
help: add gap = "8 mm"
m.toml:4:9: error: 'width' has no meaning on a slit drawn from edge to edge
    width = 1
            ^
help: 'across' takes 'gap', its length along the current
)"},
{"AcrossPlanes",
R"([[port]]
name = "feed"
across = [[0, 0, 0], [0, 1, 2]]
gap = 1
)",
R"(m.toml:3:10: error: 'across' of port 'feed' joins two planes
    across = [[0, 0, 0], [0, 1, 2]]
             ^
help: use 'bridge' between two faces
)"},
{"PortUnknownWire",
R"([[wire]]
name = "lead"
radius = 0.5
path = [[0, 0, 0], [0, 0, 20]]
[[port]]
name = "feed"
wire = "laed"
gap = 2
)",
R"(m.toml:7:8: error: port 'feed' lies on wire 'laed', which does not exist
    wire = "laed"
           ^
help: did you mean 'lead'?
)"},
{"PortNoWires",
R"([[port]]
name = "feed"
wire = "lead"
gap = 2
at = 1.5
width = 1
)",
R"(m.toml:3:8: error: port 'feed' lies on wire 'lead', which does not exist
    wire = "lead"
           ^
help: the model has no [[wire]]
m.toml:5:6: error: 'at' of port 'feed' must be from 0 to 1, but is 1.5
    at = 1.5
         ^
m.toml:6:9: error: 'width' has no meaning on a wire
    width = 1
            ^
help: remove it
)"},
{"PortImpedance",
R"([[port]]
name = "feed"
bridge = [[0, 0, 0], [0, 1, 0]]
width = 1
reference_impedance = "-50 ohm"
line = { impedance = "50 ohm", length = "1 m", velocity_factor = 1.2 }
)",
R"(m.toml:5:23: error: 'reference_impedance' of port 'feed' must be at least 0.001 ohm, but is -50 ohm
    reference_impedance = "-50 ohm"
                          ^
m.toml:6:66: error: 'velocity_factor' of the line of port 'feed' must be from 0.05 to 1, but is 1.2
    line = { impedance = "50 ohm", length = "1 m", velocity_factor = 1.2 }
                                                                     ^
)"},
{"PortComplexImpedance",
R"([[port]]
name = "feed"
bridge = [[0, 0, 0], [0, 1, 0]]
width = 1
reference_impedance = [50, 10]
)",
R"(m.toml:5:23: error: 'reference_impedance' of port 'feed' must be a resistance, but is a list
    reference_impedance = [50, 10]
                          ^
)"},
{"LumpedNoValue",
R"([[lumped]]
name = "trim"
bridge = [[0, 0, 0], [0, 1, 0]]
width = 1
)",
R"(m.toml:1:1: error: lumped part 'trim' has no value
    [[lumped]]
    ^
help: give one or more of resistance, inductance, capacitance; a short is drawn as metal
)"},
{"LumpedQualityOfResistor",
R"([[lumped]]
name = "trim"
bridge = [[0, 0, 0], [0, 1, 0]]
width = 1
resistance = "5 ohm"
quality = 200
)",
R"(m.toml:6:11: error: 'quality' has no meaning on a part without inductance or capacitance
    quality = 200
              ^
)"},
{"LumpedQualityAt",
R"([[lumped]]
name = "trim"
bridge = [[0, 0, 0], [0, 1, 0]]
width = 1
capacitance = "0.4 nH"
quality_at = "1 GHz"
)",
R"(m.toml:5:15: error: 'capacitance' of lumped part 'trim' must be a capacitance, but is an inductance
    capacitance = "0.4 nH"
                  ^
help: write it as "0.4 pF", or an expression of that kind
m.toml:6:14: error: 'quality_at' has no meaning without 'quality'
    quality_at = "1 GHz"
                 ^
)"},
{"LumpedResonance",
R"([[lumped]]
name = "trim"
bridge = [[0, 0, 0], [0, 1, 0]]
width = 1
capacitance = 1e-12
inductance = "0 nH"
self_resonance = "6 GHz"
)",
R"(m.toml:6:14: error: 'inductance' of lumped part 'trim' must be greater than 0 H, but is 0 H
    inductance = "0 nH"
                 ^
m.toml:7:18: error: 'self_resonance' has no meaning on a part that has inductance and capacitance already
    self_resonance = "6 GHz"
                     ^
)"},
};
// clang-format on

INSTANTIATE_TEST_SUITE_P(Each, PartsFaults, testing::ValuesIn(cases), case_name);

}  // namespace
}  // namespace annulet
