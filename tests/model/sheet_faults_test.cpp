// Faults of laminates, planes and materials.
#include "fault_case.hpp"

namespace annulet {
namespace {

class SheetFaults : public testing::TestWithParam<FaultCase> {};

TEST_P(SheetFaults, SaysExactly) {
    EXPECT_EQ(faults_of(GetParam().text), GetParam().expected);
}

// clang-format off
const FaultCase cases[] = {
{"NoName",
R"([[laminate]]
top = 0
thickness = "1.6 mm"
permittivity = 4.3
outline = { disc = { center = [0, 0], radius = 60 } }
)",
R"(m.toml:1:1: error: laminate 1 has no 'name'
    [[laminate]]
    ^
help: add name = "board"
)"},
{"EmptyName",
R"([[laminate]]
name = ""
top = 0
thickness = "1.6 mm"
permittivity = 4.3
outline = { disc = { center = [0, 0], radius = 60 } }
)",
R"(m.toml:2:8: error: 'name' of laminate 1 is empty
    name = ""
           ^
)"},
{"Permittivity",
R"([[laminate]]
name = "board"
top = 0
thickness = "0 mm"
permittivity = 0.9
loss_tangent = -0.01
outline = { disk = 1 }
)",
R"(m.toml:4:13: error: 'thickness' of laminate 'board' must be greater than 0 mm, but is 0 mm
    thickness = "0 mm"
                ^
m.toml:5:16: error: 'permittivity' of laminate 'board' must be from 1 to 1000, but is 0.9
    permittivity = 0.9
                   ^
m.toml:6:16: error: 'loss_tangent' of laminate 'board' must be from 0 to 1, but is -0.01
    loss_tangent = -0.01
                   ^
m.toml:7:11: error: the outline of laminate 'board' has no shape
    outline = { disk = 1 }
              ^
help: add one of around, ring, path, polygon, rectangle, disc, sector
m.toml:7:13: error: unknown key 'disk' in the outline of laminate 'board'
    outline = { disk = 1 }
                ^
help: did you mean 'disc'?
)"},
{"PermittivityTable",
R"([[laminate]]
name = "board"
top = 0
thickness = 1
permittivity_at = "1 GHz"
permittivity = [["3 GHz", 4.4], ["1 GHz", 4.3], 4.2]
outline = { disc = { center = [0, 0], radius = 60 } }
)",
R"(m.toml:5:19: error: 'permittivity_at' has no meaning beside a table of permittivities
    permittivity_at = "1 GHz"
                      ^
m.toml:6:34: error: frequencies of 'permittivity' of laminate 'board' must ascend, but 1 GHz follows 3 GHz
    permittivity = [["3 GHz", 4.4], ["1 GHz", 4.3], 4.2]
                                     ^
m.toml:6:49: error: each entry of 'permittivity' of laminate 'board' must be [frequency, permittivity]
    permittivity = [["3 GHz", 4.4], ["1 GHz", 4.3], 4.2]
                                                    ^
help: write ["1 GHz", 4.3]
)"},
{"PermittivityEmpty",
R"([[laminate]]
name = "board"
top = 0
thickness = 1
permittivity = []
outline = 3
)",
R"(m.toml:5:16: error: 'permittivity' of laminate 'board' is an empty list
    permittivity = []
                   ^
m.toml:6:11: error: 'outline' of laminate 'board' must be a table, but is a number
    outline = 3
              ^
help: write outline = { ... }
)"},
{"AroundUnknown",
R"([[laminate]]
name = "board"
top = 0
thickness = 1
permittivity = 4.3
outline = { around = { metal = "bend", margin = "3 mm" } }
[[metal]]
name = "band"
on = "board.top"
disc = { center = [0, 0], radius = 5 }
)",
R"(m.toml:6:32: error: the outline of laminate 'board' is around metal 'bend', which does not exist
    outline = { around = { metal = "bend", margin = "3 mm" } }
                                   ^
help: did you mean 'band'?
)"},
{"Overlap",
R"([[laminate]]
name = "board"
top = 0
thickness = "1.6 mm"
permittivity = 4.3
outline = { disc = { center = [0, 0], radius = 60 } }
[[laminate]]
name = "lid"
top = 1
thickness = 2
permittivity = 2.3
outline = { rectangle = { center = [50, 0], size = [30, 30] } }
[[metal]]
name = "band"
on = "board.top"
disc = { center = [0, 0], radius = 5 }
)",
R"(m.toml:7:1: error: laminate 'lid' overlaps laminate 'board' (line 1) from -1 mm to 0 mm
    [[laminate]]
    ^
help: move one of them: sheets may touch but not overlap
)"},
{"DuplicateName",
R"([[metal]]
name = "band"
plane = 0
disc = { center = [0, 0], radius = 5 }
[[metal]]
name = "band"
plane = 0
disc = { center = [9, 0], radius = 5 }
)",
R"(m.toml:5:1: error: metal 'band' has the name of the one in line 1
    [[metal]]
    ^
help: give each its own name
)"},
{"NoPlane",
R"([[metal]]
name = "band"
disc = { center = [0, 0], radius = 5 }
)",
R"(m.toml:1:1: error: metal 'band' has no plane
    [[metal]]
    ^
help: add on = "board.top", a face of a laminate, or plane = "0 mm"
)"},
{"TwoPlanes",
R"([[metal]]
name = "band"
plane = 0
on = "board.top"
disc = { center = [0, 0], radius = 5 }
)",
R"(m.toml:4:6: error: metal 'band' has 2 planes, 'plane' and 'on'
    on = "board.top"
         ^
help: keep exactly one of on, plane
)"},
{"UnknownLaminate",
R"([[metal]]
name = "band"
on = "bord.top"
disc = { center = [0, 0], radius = 5 }
[[laminate]]
name = "board"
top = 0
thickness = 1
permittivity = 4.3
outline = { disc = { center = [0, 0], radius = 60 } }
)",
R"(m.toml:3:6: error: 'on' of metal 'band': there is no laminate 'bord'
    on = "bord.top"
         ^
help: did you mean 'board'?
)"},
{"NoLaminate",
R"([[metal]]
name = "band"
on = "board.top"
disc = { center = [0, 0], radius = 5 }
)",
R"(m.toml:3:6: error: 'on' of metal 'band': there is no laminate 'board'
    on = "board.top"
         ^
help: the model has no [[laminate]]; give plane = "0 mm" instead
)"},
{"UnknownFace",
R"([[metal]]
name = "band"
on = "board.side"
disc = { center = [0, 0], radius = 5 }
[[laminate]]
name = "board"
top = 0
thickness = 1
permittivity = 4.3
outline = { disc = { center = [0, 0], radius = 60 } }
)",
R"(m.toml:3:6: error: 'on' of metal 'band': laminate 'board' has no face 'side'
    on = "board.side"
         ^
help: faces are top and bottom
)"},
{"NoFace",
R"([[metal]]
name = "band"
on = "0 mm"
disc = { center = [0, 0], radius = 5 }
)",
R"(m.toml:3:6: error: 'on' of metal 'band' must be a face of a laminate
    on = "0 mm"
         ^
help: write it as "board.top" or "board.bottom", or give plane = "0 mm"
)"},
{"MaterialOnCut",
R"([[metal]]
name = "slot"
plane = 0
cut = true
material = "copper"
disc = { center = [0, 0], radius = 5 }
)",
R"(m.toml:5:12: error: 'material' has no meaning on a cut, which takes metal away
    material = "copper"
               ^
help: remove it, or remove cut = true
)"},
{"CutIsText",
R"([[metal]]
name = "slot"
plane = 0
cut = "yes"
disc = { center = [0, 0], radius = 5 }
)",
R"(m.toml:4:7: error: 'cut' of metal 'slot' must be true or false, but is a text
    cut = "yes"
          ^
)"},
{"UnknownMaterial",
R"([[metal]]
name = "band"
plane = 0
material = "coper"
disc = { center = [0, 0], radius = 5 }
)",
R"(m.toml:4:12: error: unknown material 'coper'
    material = "coper"
               ^
help: did you mean 'copper'?
)"},
{"TwoMaterials",
R"([[metal]]
name = "band"
plane = 0
material = "copper"
conductivity = "5.8e7 S"
disc = { center = [0, 0], radius = 5 }
)",
R"(m.toml:5:16: error: metal 'band' has both a material and a conductivity
    conductivity = "5.8e7 S"
                   ^
help: keep one of them
m.toml:5:16: error: 'conductivity' of metal 'band' must be a conductivity, but is a conductance
    conductivity = "5.8e7 S"
                   ^
help: write it as "5.8e7 S/m", or an expression of that kind
)"},
{"EdgeReserved",
R"([[metal]]
name = "band"
plane = 0
edge = { undercut = "10 um" }
disc = { center = [0, 0], radius = 5 }
)",
R"(m.toml:4:1: error: 'edge' is reserved for a later version
    edge = { undercut = "10 um" }
    ^
help: remove it: the model is solved without
)"},
};
// clang-format on

INSTANTIATE_TEST_SUITE_P(Each, SheetFaults, testing::ValuesIn(cases), case_name);

}  // namespace
}  // namespace annulet
