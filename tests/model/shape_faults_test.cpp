// Faults of planar shapes and vias.
#include "fault_case.hpp"

namespace annulet {
namespace {

class ShapeFaults : public testing::TestWithParam<FaultCase> {};

TEST_P(ShapeFaults, SaysExactly) {
    EXPECT_EQ(faults_of(GetParam().text), GetParam().expected);
}

// clang-format off
const FaultCase cases[] = {
{"NoShape",
R"([[metal]]
name = "band"
plane = 0
)",
R"(m.toml:1:1: error: metal 'band' has no shape
    [[metal]]
    ^
help: add one of ring, path, polygon, rectangle, disc, sector
)"},
{"TwoShapes",
R"([[metal]]
name = "band"
plane = 0
disc = { center = [0, 0], radius = 5 }
ring = { center = [0, 0], radius = 5, width = 1 }
)",
R"(m.toml:5:8: error: metal 'band' has 2 shapes, 'disc' and 'ring'
    ring = { center = [0, 0], radius = 5, width = 1 }
           ^
help: keep exactly one of ring, path, polygon, rectangle, disc, sector
)"},
{"ShapeIsNumber",
R"([[metal]]
name = "band"
plane = 0
disc = 5
)",
R"(m.toml:4:8: error: 'disc' of metal 'band' must be a table, but is a number
    disc = 5
           ^
help: write disc = { ... }
)"},
{"RingKeys",
R"([[metal]]
name = "band"
plane = 0
ring = { centre = [0, 0], radius = "54.9 MHz", width = -8 }
)",
R"(m.toml:4:8: error: the ring of metal 'band' has no 'center'
    ring = { centre = [0, 0], radius = "54.9 MHz", width = -8 }
           ^
help: add center = [0, 0]
m.toml:4:10: error: unknown key 'centre' in the ring of metal 'band'
    ring = { centre = [0, 0], radius = "54.9 MHz", width = -8 }
             ^
help: did you mean 'center'?
m.toml:4:36: error: 'radius' of the ring of metal 'band' must be a length, but is a frequency
    ring = { centre = [0, 0], radius = "54.9 MHz", width = -8 }
                                       ^
help: write it as "8 mm", or an expression of that kind
m.toml:4:56: error: 'width' of the ring of metal 'band' must be greater than 0 mm, but is -8 mm
    ring = { centre = [0, 0], radius = "54.9 MHz", width = -8 }
                                                           ^
)"},
{"RingTooWide",
R"([[metal]]
name = "band"
plane = 0
ring = { center = [0, 0], radius = 5, width = 12 }
)",
R"(m.toml:4:47: error: 'width' of the ring of metal 'band' must be less than twice the radius, 10 mm, but is 12 mm
    ring = { center = [0, 0], radius = 5, width = 12 }
                                                  ^
help: radius is that of the centre line; a full disc is 'disc'
)"},
{"NumberIsFlag",
R"([[metal]]
name = "band"
plane = 0
disc = { center = 3, radius = true }
)",
R"(m.toml:4:19: error: 'center' of the disc of metal 'band' must be a point, but is a number
    disc = { center = 3, radius = true }
                      ^
help: write it as [x, y]
m.toml:4:31: error: 'radius' of the disc of metal 'band' must be a length, but is true or false
    disc = { center = 3, radius = true }
                                  ^
help: write it as "8 mm"
)"},
{"PointOfOne",
R"([[metal]]
name = "band"
plane = 0
disc = { center = [3], radius = 5 }
)",
R"(m.toml:4:19: error: 'center' of the disc of metal 'band' must be a point, but has 1 coordinate
    disc = { center = [3], radius = 5 }
                      ^
help: write it as [x, y] or [x, y, z]
)"},
{"PointOfThree",
R"([[metal]]
name = "band"
plane = 0
disc = { center = [1, 2, 3], radius = 5 }
)",
R"(m.toml:4:19: error: 'center' of the disc of metal 'band' lies in a plane and takes two coordinates, but has three
    disc = { center = [1, 2, 3], radius = 5 }
                      ^
)"},
{"FarAway",
R"([[metal]]
name = "band"
plane = 0
disc = { center = [0, "2000 km"], radius = 5 }
)",
R"(m.toml:4:23: error: y of 'center' of the disc of metal 'band' must be from -1000 km to 1000 km, but is 2000 km
    disc = { center = [0, "2000 km"], radius = 5 }
                          ^
)"},
{"PercentAsLength",
R"([[metal]]
name = "band"
plane = 0
disc = { center = [0, 0], radius = "5 %" }
)",
R"(m.toml:4:36: error: 'radius' of the disc of metal 'band' must be a length, but is a ratio
    disc = { center = [0, 0], radius = "5 %" }
                                       ^
help: write it as "8 mm", or an expression of that kind
)"},
{"RectangleSize",
R"([[metal]]
name = "band"
plane = 0
rectangle = { center = [0, 0], size = [0, -2], rotation = "15 mm" }
)",
R"(m.toml:4:40: error: x of 'size' of the rectangle of metal 'band' must be greater than 0 mm, but is 0 mm
    rectangle = { center = [0, 0], size = [0, -2], rotation = "15 mm" }
                                           ^
m.toml:4:43: error: y of 'size' of the rectangle of metal 'band' must be greater than 0 mm, but is -2 mm
    rectangle = { center = [0, 0], size = [0, -2], rotation = "15 mm" }
                                              ^
m.toml:4:59: error: 'rotation' of the rectangle of metal 'band' must be an angle, but is a length
    rectangle = { center = [0, 0], size = [0, -2], rotation = "15 mm" }
                                                              ^
help: write it as "15 deg", or an expression of that kind
)"},
{"Sector",
R"([[metal]]
name = "band"
plane = 0
sector = { center = [0, 0], inner_radius = 6, outer_radius = 5, sweep = 400 }
)",
R"(m.toml:4:44: error: 'inner_radius' of the sector of metal 'band' must be less than the outer radius, 5 mm, but is 6 mm
    sector = { center = [0, 0], inner_radius = 6, outer_radius = 5, sweep = 400 }
                                               ^
m.toml:4:73: error: 'sweep' of the sector of metal 'band' must be greater than 0 deg and at most 360 deg, but is 400 deg
    sector = { center = [0, 0], inner_radius = 6, outer_radius = 5, sweep = 400 }
                                                                            ^
)"},
{"PolygonOfTwo",
R"([[metal]]
name = "band"
plane = 0
polygon = [[0, 0], [1, 0]]
)",
R"(m.toml:4:11: error: the polygon of metal 'band' has 2 corners, fewer than 3
    polygon = [[0, 0], [1, 0]]
              ^
)"},
{"PolygonIsText",
R"([[metal]]
name = "band"
plane = 0
polygon = "square"
)",
R"(m.toml:4:11: error: the polygon of metal 'band' must be a list of points
    polygon = "square"
              ^
help: write it as { points = [[0, 0], [10, 0], [0, 10]] }
)"},
{"PolygonCorners",
R"([[metal]]
name = "band"
plane = 0
polygon = { points = [[0, 0], [1, 0], [1, 0], [1, 1]] }
)",
R"(m.toml:4:39: error: corners 2 and 3 of the polygon of metal 'band' coincide at (1, 0) mm
    polygon = { points = [[0, 0], [1, 0], [1, 0], [1, 1]] }
                                          ^
help: leave one of them out
)"},
{"PolygonCrosses",
R"([[metal]]
name = "band"
plane = 0
polygon = { points = [[0, 0], [10, 10], [10, 0], [0, 10]] }
)",
R"(m.toml:4:22: error: the outline of the polygon of metal 'band' crosses or touches itself: the edges from (0, 0) mm and from (10, 0) mm
    polygon = { points = [[0, 0], [10, 10], [10, 0], [0, 10]] }
                         ^
help: list the corners in order around the figure; holes are separate cuts
)"},
{"PolygonSpike",
R"([[metal]]
name = "band"
plane = 0
polygon = { points = [[0, 0], [10, 0], [5, 0], [5, 10]] }
)",
R"(m.toml:4:22: error: the outline of the polygon of metal 'band' crosses or touches itself: the edges from (0, 0) mm and from (10, 0) mm
    polygon = { points = [[0, 0], [10, 0], [5, 0], [5, 10]] }
                         ^
help: list the corners in order around the figure; holes are separate cuts
)"},
{"PathOfOne",
R"([[metal]]
name = "band"
plane = 0
path = { points = [[0, 0]], width = 2 }
)",
R"(m.toml:4:19: error: the path of metal 'band' has fewer than two points
    path = { points = [[0, 0]], width = 2 }
                      ^
help: a path runs from one point at least to another, or along an arc
)"},
{"PathCoincides",
R"([[metal]]
name = "band"
plane = 0
path = { points = [[0, 0], [10, 0], [10, 0]], width = 2 }
)",
R"(m.toml:4:37: error: points 2 and 3 of the path of metal 'band' coincide at (10, 0) mm
    path = { points = [[0, 0], [10, 0], [10, 0]], width = 2 }
                                        ^
help: leave one of them out
)"},
{"PathWidths",
R"([[metal]]
name = "band"
plane = 0
path = { points = [[0, 0], [10, 0]], width = [1, 2, 3] }
)",
R"(m.toml:4:46: error: 'width' of the path of metal 'band' must be one width or two, but has 3 entries
    path = { points = [[0, 0], [10, 0]], width = [1, 2, 3] }
                                                 ^
help: write [width at the start, width at the end] for a taper
)"},
{"PathClosedTaper",
R"([[metal]]
name = "band"
plane = 0
path = { points = [[0, 0], [10, 0], [0, 10]], width = [1, 2], closed = true }
)",
R"(m.toml:4:55: error: the closed path of metal 'band' cannot be tapered
    path = { points = [[0, 0], [10, 0], [0, 10]], width = [1, 2], closed = true }
                                                          ^
help: give one width, or leave the path open
)"},
{"PathCrosses",
R"([[metal]]
name = "band"
plane = 0
path = { points = [[0, 0], [10, 0], [5, 5], [5, -5]], width = 1 }
)",
R"(m.toml:4:19: error: the path of metal 'band' crosses, touches or folds back on itself near (5, 5) mm
    path = { points = [[0, 0], [10, 0], [5, 5], [5, -5]], width = 1 }
                      ^
help: draw the branches as separate metal: pieces that overlap are one conductor
)"},
{"PathBeginsWithArc",
R"([[metal]]
name = "band"
plane = 0
path = { points = [{ arc = { center = [0, 5], sweep = 90 } }, [0, 0]], width = 1 }
)",
R"(m.toml:4:20: error: the path of metal 'band' begins with an arc
    path = { points = [{ arc = { center = [0, 5], sweep = 90 } }, [0, 0]], width = 1 }
                       ^
help: begin with the point where the arc starts
)"},
{"ArcSweepZero",
R"([[metal]]
name = "band"
plane = 0
path = { points = [[0, 0], { arc = { center = [0, 5], sweep = 0 } }], width = 1 }
)",
R"(m.toml:4:63: error: 'sweep' of the arc at point 2 of the path of metal 'band' is zero
    path = { points = [[0, 0], { arc = { center = [0, 5], sweep = 0 } }], width = 1 }
                                                                  ^
)"},
{"ArcCenter",
R"([[metal]]
name = "band"
plane = 0
path = { points = [[0, 0], { arc = { center = [0, 0], sweep = 90 } }], width = 1 }
)",
R"(m.toml:4:47: error: the arc at point 2 of the path of metal 'band' has its center on its starting point (0, 0) mm
    path = { points = [[0, 0], { arc = { center = [0, 0], sweep = 90 } }], width = 1 }
                                                  ^
)"},
{"ArcTight",
R"([[metal]]
name = "band"
plane = 0
path = { points = [[0, 0], { arc = { center = [0, 3], sweep = 90 } }], width = 8 }
)",
R"(m.toml:4:28: error: the arc at point 2 of the path of metal 'band' has radius 3 mm, not more than half the width 8 mm
    path = { points = [[0, 0], { arc = { center = [0, 3], sweep = 90 } }], width = 8 }
                               ^
help: its inner edge would cross itself; widen the arc or narrow the strip
)"},
{"ViaWithoutLength",
R"([[via]]
name = "stitch"
at = [0, 0]
diameter = "0.6 mm"
from = "1 mm"
to = 1
)",
R"(m.toml:6:6: error: via 'stitch' has no length: it begins and ends at 1 mm
    to = 1
         ^
)"},
};
// clang-format on

INSTANTIATE_TEST_SUITE_P(Each, ShapeFaults, testing::ValuesIn(cases), case_name);

}  // namespace
}  // namespace annulet
