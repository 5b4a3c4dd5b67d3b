// Faults of the tables with goals and settings, and of several items together.
#include "fault_case.hpp"

namespace annulet {
namespace {

class SettingsFaults : public testing::TestWithParam<FaultCase> {};

TEST_P(SettingsFaults, SaysExactly) {
    EXPECT_EQ(faults_of(GetParam().text), GetParam().expected);
}

// clang-format off
const FaultCase cases[] = {
{"BandFalls",
R"([goal]
band = ["870 MHz", "863 MHz"]
vswr = 1
)",
R"(m.toml:2:8: error: 'band' of [goal] must rise, but runs from 870 MHz to 863 MHz
    band = ["870 MHz", "863 MHz"]
           ^
help: write the lower frequency first
m.toml:3:8: error: 'vswr' of [goal] must be greater than 1 and at most 1000, but is 1
    vswr = 1
           ^
)"},
{"BandOfOne",
R"([goal]
band = ["870 MHz"]
)",
R"(m.toml:2:8: error: 'band' of [goal] must have two frequencies, but has 1
    band = ["870 MHz"]
           ^
help: write band = ["863 MHz", "870 MHz"]
)"},
{"RejectNoBand",
R"([goal]
reject = [ { name = "broadcast" }, 3 ]
)",
R"(m.toml:2:12: error: reject band 'broadcast' has no 'band'
    reject = [ { name = "broadcast" }, 3 ]
               ^
help: add band = ["470 MHz", "694 MHz"]
m.toml:2:36: error: each entry of 'reject' must be a table
    reject = [ { name = "broadcast" }, 3 ]
                                       ^
help: write { name = "broadcast", band = ["470 MHz", "694 MHz"] }
)"},
{"RejectTwice",
R"([goal]
reject = [ { name = "a", band = [1e6, 2e6] }, { name = "a", band = [3e6, 4e6] } ]
)",
R"(m.toml:2:47: error: reject band 'a' has the name of the one in line 2
    reject = [ { name = "a", band = [1e6, 2e6] }, { name = "a", band = [3e6, 4e6] } ]
                                                  ^
help: give each its own name
)"},
{"SweepFalls",
R"([sweep]
from = "3 GHz"
to = "100 MHz"
)",
R"(m.toml:3:6: error: [sweep] must rise, but runs from 3 GHz to 100 MHz
    to = "100 MHz"
         ^
help: exchange them, or write at = [...] for single frequencies
)"},
{"SweepPoints",
R"([sweep]
from = 0
to = "3 GHz"
points = 2000000
)",
R"(m.toml:2:8: error: 'from' of [sweep] must be from 1 Hz to 10 THz, but is 0 Hz
    from = 0
           ^
m.toml:4:10: error: 'points' of [sweep] must be from 2 to 1000000, but is 2000000
    points = 2000000
             ^
)"},
{"SweepHalfPoint",
R"([sweep]
from = "1 GHz"
to = "3 GHz"
points = 10.5
)",
R"(m.toml:4:10: error: 'points' of [sweep] must be a whole number, but is 10.5
    points = 10.5
             ^
)"},
{"SweepAtAndFrom",
R"([sweep]
at = ["868.3 MHz"]
from = "1 GHz"
)",
R"(m.toml:3:8: error: 'from' has no meaning beside 'at'
    from = "1 GHz"
           ^
help: keep either at = [...] or from, to and points
)"},
{"SweepAtEmpty",
R"([sweep]
at = []
)",
R"(m.toml:2:6: error: 'at' of [sweep] is an empty list
    at = []
         ^
help: write at = ["868.3 MHz"]
)"},
{"SweepNoEnd",
R"([sweep]
from = "1 GHz"
)",
R"(m.toml:1:1: error: [sweep] has no 'to'
    [sweep]
    ^
help: add to = "868.3 MHz"
)"},
{"SweepAtNumber",
R"([sweep]
at = "868.3 MHz"
)",
R"(m.toml:2:6: error: 'at' of [sweep] must be a list, but is a text
    at = "868.3 MHz"
         ^
)"},
{"Transmit",
R"([transmit]
power = "25 ohm"
duty = "120 %"
)",
R"(m.toml:2:9: error: 'power' of [transmit] must be a power, but is a resistance
    power = "25 ohm"
            ^
help: write it as "25 mW", or an expression of that kind
m.toml:3:8: error: 'duty' of [transmit] must be greater than 0 % and at most 100 %, but is 120 %
    duty = "120 %"
           ^
)"},
{"Fabrication",
R"([fabrication]
minimum_slot = 0
tolerance = { etch = "0.05 mm", thickness = "1 mm" }
)",
R"(m.toml:2:16: error: 'minimum_slot' of [fabrication] must be greater than 0 mm, but is 0 mm
    minimum_slot = 0
                   ^
m.toml:3:45: error: 'thickness' of 'tolerance' of [fabrication] must be a fraction, but is a length
    tolerance = { etch = "0.05 mm", thickness = "1 mm" }
                                                ^
help: write it as "5 %", or an expression of that kind
)"},
{"ToleranceIsNumber",
R"([fabrication]
tolerance = 3
)",
R"(m.toml:2:13: error: 'tolerance' of [fabrication] must be a table, but is a number
    tolerance = 3
                ^
help: write tolerance = { ... }
)"},
{"Accuracy",
R"([accuracy]
laminate = "exact"
resonance = "0 %"
layers = 0
cells_across = 2.5
)",
R"(m.toml:2:12: error: 'laminate' of [accuracy] must be "full" or "static", but is "exact"
    laminate = "exact"
               ^
m.toml:3:13: error: 'resonance' of [accuracy] must be from 0.0001 % to 50 %, but is 0 %
    resonance = "0 %"
                ^
m.toml:4:10: error: 'layers' of [accuracy] must be from 1 to 20, but is 0
    layers = 0
             ^
m.toml:5:16: error: 'cells_across' of [accuracy] must be a whole number, but is 2.5
    cells_across = 2.5
                   ^
)"},
{"FeatureNothing",
R"([[feature]]
name = "slot"
off = {}
)",
R"(m.toml:3:7: error: 'off' of feature 'slot' changes nothing
    off = {}
          ^
help: write set = { parameter = value } or omit = ["item"]
)"},
{"FeatureNoOff",
R"([[feature]]
name = "slot"
)",
R"(m.toml:1:1: error: feature 'slot' has no 'off'
    [[feature]]
    ^
help: add off = { set = { gap = 1.0 }, omit = ["trim"] }
)"},
{"FeatureUnknown",
R"([parameters]
gap = 1
[[feature]]
name = "slot"
off = { set = { gpa = 2 }, omit = ["trim", 3] }
)",
R"(m.toml:5:17: error: feature 'slot' sets 'gpa', which is no parameter
    off = { set = { gpa = 2 }, omit = ["trim", 3] }
                    ^
help: did you mean 'gap'?
m.toml:5:36: error: feature 'slot' leaves out 'trim', which does not exist
    off = { set = { gpa = 2 }, omit = ["trim", 3] }
                                       ^
m.toml:5:44: error: each entry of 'omit' of feature 'slot' must be the name of an item
    off = { set = { gpa = 2 }, omit = ["trim", 3] }
                                               ^
help: write omit = ["trim"]
)"},
{"FeatureLeavesOutPort",
R"([[port]]
name = "feed"
bridge = [[0, 0, 0], [0, 1, 0]]
width = 1
[[feature]]
name = "slot"
off = { omit = ["feed"] }
)",
R"(m.toml:7:17: error: feature 'slot' leaves out 'feed', which is a port
    off = { omit = ["feed"] }
                    ^
help: a port cannot be left out
)"},
{"NoConductor",
R"(title = "nothing"
)",
R"(m.toml:1:1: error: the model has no conductor
    title = "nothing"
    ^
help: add a [[metal]] or a [[wire]]
)"},
{"GroundAbove",
R"([ground]
plane = 0
[[metal]]
name = "band"
plane = -1
disc = { center = [0, 0], radius = 5 }
[[metal]]
name = "patch"
plane = 0
disc = { center = [0, 0], radius = 5 }
[[wire]]
name = "lead"
radius = 0.5
path = [[0, 0, 0], [0, 0, -20]]
[[via]]
name = "stitch"
at = [0, 0]
diameter = 1
from = -2
to = 0
[[laminate]]
name = "board"
top = 0
thickness = 1
permittivity = 2
outline = { disc = { center = [0, 0], radius = 60 } }
)",
R"(m.toml:3:1: error: metal 'band' at -1 mm lies below the ground plane at 0 mm
    [[metal]]
    ^
help: move it up, or lower the plane of [ground]
m.toml:7:1: error: metal 'patch' at 0 mm lies in the ground plane at 0 mm
    [[metal]]
    ^
help: move it up, or lower the plane of [ground]
m.toml:11:1: error: the lowest point of wire 'lead' at -20 mm lies below the ground plane at 0 mm
    [[wire]]
    ^
help: move it up, or lower the plane of [ground]
m.toml:15:1: error: the end of via 'stitch' at -2 mm lies below the ground plane at 0 mm
    [[via]]
    ^
help: move it up, or lower the plane of [ground]
m.toml:21:1: error: the lower face of laminate 'board' at -1 mm lies below the ground plane at 0 mm
    [[laminate]]
    ^
help: move it up, or lower the plane of [ground]
)"},
};
// clang-format on

INSTANTIATE_TEST_SUITE_P(Each, SettingsFaults, testing::ValuesIn(cases), case_name);

}  // namespace
}  // namespace annulet
