#include <random>

#include "mesh_support.hpp"

namespace annulet::test {
namespace {

TEST(StripMesh, WholeRingKeepsItsAreaAndSymmetry) {
    Model model;
    model.metals = {metal("band", ring(54 * mm, 8 * mm))};
    for (const double frequency : {0.0, 1e9, 3e9}) {
        MeshOptions options;
        options.top_frequency_hz = frequency;
        const Mesh mesh = make_mesh(model, options);
        EXPECT_EQ(expect_sound(mesh), 2 * static_cast<int>(mesh.cells.size()) / 3);
        // Area between two circles: 2 pi R w.
        const double area = 2 * pi * 54 * mm * 8 * mm;
        EXPECT_NEAR(total_area(mesh) / area, 1.0, 1e-12);
        EXPECT_NEAR(mesh.nodes[0].y(), 0.0, 1e-15);
        expect_mirrored(
            mesh, [](const Vec3& p) { return Vec3(p.x(), -p.y(), 0); }, 1e-15);
        expect_mirrored(
            mesh, [](const Vec3& p) { return Vec3(-p.x(), p.y(), 0); }, 1e-15);
    }
}

TEST(StripMesh, CellsAroundFollowCurvatureAndWavelength) {
    Model model;
    model.metals = {metal("band", ring(54 * mm, 8 * mm))};
    MeshOptions options;
    EXPECT_EQ(make_mesh(model, options).cells.size(), 24u * 3u);
    options.top_frequency_hz = 3e9;
    const double cells = 2 * pi * 54 * mm / (constants::c0_m_per_s / 3e9 / 20);
    const auto around = make_mesh(model, options).cells.size() / 3;
    EXPECT_GE(static_cast<double>(around), cells - 0.4);
    EXPECT_LT(static_cast<double>(around), cells + 4);
}

double edge_fraction(MeshOptions options) {
    Model model;
    model.metals = {metal("line", box(0, 0, 100 * mm, 10 * mm))};
    const Mesh mesh = make_mesh(model, options);
    double nearest = 1;
    for (const Vec3& p : mesh.nodes)
        if (p.y() > -5 * mm + 1e-9) nearest = std::min(nearest, p.y() + 5 * mm);
    return nearest / (10 * mm);
}

TEST(StripMesh, EdgeCellsAreAsAsked) {
    MeshOptions options;
    EXPECT_NEAR(edge_fraction(options), 0.06, 1e-12);
    options.edge_cell_fraction = 0;
    options.cells_across = 6;
    EXPECT_NEAR(edge_fraction(options), (1 - std::cos(pi / 6)) / 2, 1e-12);
    options.edge_cell_fraction = -1;
    EXPECT_NEAR(edge_fraction(options), 1.0 / 6, 1e-12);
}

TEST(StripMesh, RefinementDoublesBothDirections) {
    for (const double fraction : {0.06, 0.0, -1.0}) {
        MeshOptions options;
        options.edge_cell_fraction = fraction;
        options.top_frequency_hz = 1.2e9;
        const Mesh coarse = make_mesh(gauge_ring(1.2 * mm), options);
        options.refine = 2;
        const Mesh fine = make_mesh(gauge_ring(1.2 * mm), options);
        EXPECT_EQ(fine.cells.size(), 4 * coarse.cells.size());
        EXPECT_EQ(fine.ports[0].members.size(), 4 * coarse.ports[0].members.size());
        expect_sound(fine);
    }
}

TEST(StripMesh, CutEndsLieOnTheCutAndCornersOnTheCircles) {
    const Mesh mesh = make_mesh(gauge_ring(1.2 * mm), {});
    expect_sound(mesh);
    int on_cut = 0;
    for (const Vec3& p : mesh.nodes)
        if (p.x() > 0 && std::abs(std::abs(p.y()) - 0.6 * mm) < 1e-14) ++on_cut;
    EXPECT_EQ(on_cut, 2 * 6);
    expect_mirrored(
        mesh, [](const Vec3& p) { return Vec3(p.x(), -p.y(), 0); }, 1e-15);
}

// The metal left by the cut: between the circles, less the slot |y| < g/2 at x > 0.
double cut_ring_area(double r1, double r2, double g) {
    const auto slot = [g](double r) {  // area of the disc with |y| < g/2, x > 0
        const double h = g / 2;
        return r * r * std::asin(h / r) + h * std::sqrt(r * r - h * h);
    };
    return pi * (r2 * r2 - r1 * r1) - (slot(r2) - slot(r1));
}

TEST(StripMesh, CutRingKeepsItsArea) {
    Model model = gauge_ring(8 * mm);
    for (const double gap : {1.2 * mm, 12 * mm}) {
        model.metals[1] = cut("feed gap", box(54.9 * mm, 0, 16 * mm, gap));
        model.ports = {port("feed", bridge({54.9 * mm, -gap / 2}, {54.9 * mm, gap / 2}, 8 * mm))};
        const Mesh mesh = make_mesh(model, {});
        expect_sound(mesh);
        const double metal_area = total_area(mesh) - gap_area(mesh, mesh.ports[0]);
        EXPECT_NEAR(metal_area / cut_ring_area(50.9 * mm, 58.9 * mm, gap), 1.0, 1e-11) << gap;
        EXPECT_NEAR(mesh.ports[0].length_m, gap, 1e-12);
    }
}

TEST(StripMesh, SizesGrowGentlyFromTheGap) {
    const Mesh mesh = make_mesh(gauge_ring(8 * mm), {});
    std::set<double> angles;
    for (const Vec3& p : mesh.nodes)
        if (p.y() > 0.5 * mm && p.head<2>().norm() < 51.25 * mm) angles.insert(std::atan2(p.y(), p.x()));
    std::vector<double> sorted(angles.begin(), angles.end());
    ASSERT_GT(sorted.size(), 10u);
    EXPECT_LT((sorted[1] - sorted[0]) * 50.9 * mm, 1.2 * mm);
    for (std::size_t i = 2; i < sorted.size(); ++i) {
        const double ratio = (sorted[i] - sorted[i - 1]) / (sorted[i - 1] - sorted[i - 2]);
        EXPECT_LT(ratio, 2.0);
        EXPECT_GT(ratio, 0.5);
        EXPECT_LT(sorted[i] - sorted[i - 1], pi / 12 * 1.001);
    }
}

TEST(StripMesh, MitredClosedPathKeepsItsAreaAndSymmetry) {
    Model model;
    const double a = 30 * mm, w = 4 * mm;
    model.metals = {metal("frame", path({a, -a}, {{a, a}, {-a, a}, {-a, -a}, {a, -a}}, w, true))};
    const Mesh mesh = make_mesh(model, {});
    expect_sound(mesh);
    EXPECT_NEAR(total_area(mesh), 8 * a * w, 1e-15);
    expect_mirrored(
        mesh, [](const Vec3& p) { return Vec3(p.y(), p.x(), 0); }, 1e-15);
    int corners = 0;
    for (const Vec3& p : mesh.nodes) corners += (p - Vec3(a + w / 2, a + w / 2, 0)).norm() < 1e-15 ? 1 : 0;
    EXPECT_EQ(corners, 1);
}

TEST(StripMesh, LineIntoArcIsOneStripWithItsArea) {
    // A hairpin: two legs of 40 mm joined by a half circle of 20 mm radius.
    const double r = 20 * mm, leg = 40 * mm, w = 3 * mm;
    StripPath hairpin = path({r, -leg}, {{r, 0}}, w);
    hairpin.pieces.push_back({true, {-r, 0}, {0, 0}, pi});
    hairpin.pieces.push_back({false, {-r, -leg}, {0, 0}, 0});
    Model model;
    model.metals = {metal("hairpin", hairpin)};
    const Mesh mesh = make_mesh(model, {});
    expect_sound(mesh);
    EXPECT_NEAR(total_area(mesh) / (2 * leg * w + pi * r * w), 1.0, 1e-12);
    expect_mirrored(
        mesh, [](const Vec3& p) { return Vec3(-p.x(), p.y(), 0); }, 1e-15);
}

TEST(StripMesh, TaperedPathsKeepTheirArea) {
    StripPath taper = path({0, 0}, {{50 * mm, 0}}, 2 * mm);
    taper.width_end_m = 8 * mm;
    Model model;
    model.metals = {metal("taper", taper)};
    EXPECT_NEAR(total_area(make_mesh(model, {})), 50 * mm * 5 * mm, 1e-15);
    StripPath spiral = path({20 * mm, 0}, {}, 2 * mm);
    spiral.width_end_m = 6 * mm;
    spiral.pieces.push_back({true, {0, 20 * mm}, {0, 0}, pi / 2});
    model.metals = {metal("tapered arc", spiral)};
    const Mesh mesh = make_mesh(model, {});
    expect_sound(mesh);
    EXPECT_NEAR(total_area(mesh) / (20 * mm * pi / 2 * 4 * mm), 1.0, 1e-12);
}

TEST(StripMesh, EndsThatMeetAreJoined) {
    Model model;
    model.metals = {metal("left", box(-25 * mm, 0, 50 * mm, 4 * mm)),
                    metal("right", box(25 * mm, 0, 50 * mm, 4 * mm), 2)};
    const Mesh mesh = make_mesh(model, {});
    expect_sound(mesh);
    const MeshQuality quality = mesh_quality(mesh, 0);
    const int rows = quality.quadrilaterals / 3;
    EXPECT_EQ(quality.interior_edges, 3 * (rows - 1) + 2 * rows);
    model.metals.pop_back();
    model.metals.push_back(metal("bend", Sector{{0, 20 * mm}, 18 * mm, 22 * mm, -pi / 2, pi}, 2));
    const Mesh bent = make_mesh(model, {});
    expect_sound(bent);
    const MeshQuality bent_quality = mesh_quality(bent, 0);
    const int bent_rows = bent_quality.quadrilaterals / 3;
    EXPECT_EQ(bent_quality.interior_edges, 3 * (bent_rows - 1) + 2 * bent_rows);
}

TEST(StripMesh, MemoryIsCountedBeforeItIsTaken) {
    MeshOptions options;
    options.top_frequency_hz = 1e9;
    options.memory_limit_bytes = 1e6;
    try {
        make_mesh(gauge_ring(8 * mm), options);
        FAIL() << "no refusal";
    } catch (const NumericalError& error) {
        options.memory_limit_bytes = 0;
        const int unknowns = mesh_quality(make_mesh(gauge_ring(8 * mm), options), 0).interior_edges;
        EXPECT_EQ(
            std::string(error.what()),
            "the mesh of " + std::to_string(unknowns) + " unknowns needs about 0.00" +
                std::to_string(std::lround(40.0 * unknowns * unknowns / 1e4)) +
                " GB, 0.001 GB are allowed: take fewer cells per wavelength or across, or a lower highest frequency");
    }
    options.top_frequency_hz = 1e30;
    EXPECT_THROW(make_mesh(gauge_ring(8 * mm), options), NumericalError);
}

TEST(StripMesh, ConductorsAreListedOnce) {
    Model model;
    model.metals = {metal("a", box(0, 0, 50 * mm, 4 * mm)), metal("b", box(0, 20 * mm, 50 * mm, 4 * mm), 2),
                    metal("c", box(0, 40 * mm, 50 * mm, 4 * mm), 3)};
    model.metals[2].conductor.thickness_m = 70e-6;
    const Mesh mesh = make_mesh(model, {});
    EXPECT_EQ(mesh.conductors.size(), 2u);
    EXPECT_EQ(mesh.cells.front().conductor, 0);
    EXPECT_EQ(mesh.cells.back().conductor, 1);
}

TEST(StripMesh, PlanesStackWithoutContact) {
    Model model;
    model.metals = {metal("top", ring(20 * mm, 2 * mm)), metal("bottom", ring(20 * mm, 2 * mm), 2)};
    model.metals[1].plane_m = -1.6 * mm;
    const Mesh mesh = make_mesh(model, {});
    expect_sound(mesh);
    EXPECT_EQ(mesh.nodes.back().z(), -1.6 * mm);
}

// Random strips that are valid by construction: a chain of turns gentle enough for its width, never closing.
StripPath random_path(std::mt19937& random) {
    std::uniform_real_distribution<double> unit(0, 1);
    const double width = (0.5 + 5 * unit(random)) * mm;
    StripPath p = path({0, 0}, {}, width);
    p.width_end_m = width * (0.6 + 0.8 * unit(random));
    double heading = 0;
    Vec2 at = p.start;
    for (int k = 0; k < 4; ++k) {
        const Vec2 ahead(std::cos(heading), std::sin(heading));
        if (unit(random) < 0.5) {
            at += (15 + 40 * unit(random)) * mm * ahead;
            p.pieces.push_back({false, at, {0, 0}, 0});
        } else {
            const double turn = (k % 2 == 0 ? 1 : -1) * (0.2 + unit(random)), r = (15 + 30 * unit(random)) * mm;
            const Vec2 centre = at + std::copysign(r, turn) * Vec2(-ahead.y(), ahead.x());
            const double c = std::cos(turn), s = std::sin(turn);
            const Vec2 arm = at - centre;
            at = centre + Vec2(c * arm.x() - s * arm.y(), s * arm.x() + c * arm.y());
            p.pieces.push_back({true, at, centre, turn});
            heading += turn;
        }
        heading += (unit(random) < 0.4 ? 1 : 0) * (k % 2 == 0 ? -1 : 1) * 0.5 * unit(random);
    }
    return p;
}

TEST(StripMesh, RandomStripsAreSoundAndKeepTheirCount) {
    for (unsigned seed = 1; seed <= 150; ++seed) {
        SCOPED_TRACE("seed " + std::to_string(seed));
        std::mt19937 random(seed);
        std::uniform_real_distribution<double> unit(0, 1);
        Model model;
        model.metals = {metal("strip", random_path(random))};
        MeshOptions options;
        options.cells_across = 1 + static_cast<int>(4 * unit(random));
        options.edge_cell_fraction = unit(random) < 0.3 ? 0 : unit(random) < 0.5 ? -1 : 0.06;
        options.top_frequency_hz = 2e9 * unit(random);
        const Mesh mesh = make_mesh(model, options);
        const int boundary = expect_sound(mesh);
        // One strip without holes: Euler's formula for a disc, nodes - edges + cells = 1.
        const int edges = mesh_quality(mesh, 0).interior_edges + boundary;
        EXPECT_EQ(static_cast<int>(mesh.nodes.size()) - edges + static_cast<int>(mesh.cells.size()), 1);
        options.refine = 2;
        EXPECT_EQ(make_mesh(model, options).cells.size(), 4 * mesh.cells.size());
        if (HasFailure()) return;
    }
}

}  // namespace
}  // namespace annulet::test
