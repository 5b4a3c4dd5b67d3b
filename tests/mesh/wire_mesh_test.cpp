#include <annulet/core/diagnostics.hpp>

#include "mesh/mesh_support.hpp"

namespace annulet::test {
namespace {

Wire line(const std::string& name, const std::vector<Vec3>& points, double radius, int row = 1) {
    Wire w;
    w.name = name;
    w.radius_m = radius;
    w.shape = WirePath{{points.begin(), points.end()}};
    w.where = {row, 1};
    return w;
}

Mesh meshed(const Model& model, double refine = 1) {
    MeshOptions options;
    options.top_frequency_hz = 1e9;
    options.refine = refine;
    return make_mesh(model, options);
}

std::string fault_of(const Model& model) {
    try {
        meshed(model);
    } catch (const InputError& error) {
        std::string text;
        for (const auto& f : error.faults()) text += std::to_string(f.where.line) + ": " + f.message + "\n";
        return text;
    }
    return "";
}

double length_of(const Mesh& mesh) {
    double sum = 0;
    for (const Cell& c : mesh.cells)
        sum += (mesh.nodes[std::size_t(c.node[1])] - mesh.nodes[std::size_t(c.node[0])]).norm();
    return sum;
}

TEST(WireMesh, GapCarriesItsVoltageAndIsCentred) {
    Model model;
    model.wires = {line("mast", {{0, 0, 0}, {0, 0, 0.15}}, 1 * mm)};
    model.ports = {port("feed", OnWire{"mast", 0.4, 4 * mm})};
    const Mesh mesh = meshed(model);
    double volt = 0, middle = 0;
    for (const auto& member : mesh.ports[0].members) {
        const Cell& c = mesh.cells[std::size_t(member.cell)];
        const Vec3 a = mesh.nodes[std::size_t(c.node[0])], b = mesh.nodes[std::size_t(c.node[1])];
        EXPECT_EQ(c.conductor, -1);
        volt += member.field_per_m.dot(b - a);
        middle += member.field_per_m.dot(b - a) * (a + b).z() / 2;
    }
    EXPECT_NEAR(volt, 1, 1e-12);
    EXPECT_NEAR(middle, 0.4 * 0.15, 1e-9);
    EXPECT_GE(mesh.ports[0].members.size(), 2U);
    EXPECT_NEAR(length_of(mesh), 0.15, 1e-12);
}

// Cells shrink quadratically toward the open end, and by no more than 2.5 between neighbours elsewhere.
TEST(WireMesh, CellsAreGraded) {
    Model model;
    model.wires = {line("mast", {{0, 0, 0}, {0, 0, 0.3}}, 0.1 * mm)};
    model.ports = {port("feed", OnWire{"mast", 0.5, 0.2 * mm})};
    const Mesh mesh = meshed(model, 2);
    std::vector<double> h;
    for (const Cell& c : mesh.cells)
        h.push_back((mesh.nodes[std::size_t(c.node[1])] - mesh.nodes[std::size_t(c.node[0])]).norm());
    EXPECT_NEAR(h[1] / h[0], 3, 1e-6);
    for (std::size_t i = 2; i + 3 < h.size(); ++i) EXPECT_LT(std::max(h[i + 1] / h[i], h[i] / h[i + 1]), 2.5) << i;
}

TEST(WireMesh, CircleKeepsItsArea) {
    Model model;
    Wire loop = line("loop", {}, 1 * mm);
    loop.shape = WireCircle{{0, 0, 0}, 0.05, {0, 0, 1}};
    model.wires = {loop};
    model.ports = {port("feed", OnWire{"loop", 0, 4 * mm})};
    const Mesh mesh = meshed(model);
    double area = 0;
    for (const Cell& c : mesh.cells)
        area += 0.5 * mesh.nodes[std::size_t(c.node[0])].cross(mesh.nodes[std::size_t(c.node[1])]).z();
    EXPECT_NEAR(area / (pi * 0.05 * 0.05), 1, 1e-9);
    Vec3 gap(0, 0, 0);
    for (const auto& member : mesh.ports[0].members)
        for (int k = 0; k < 2; ++k)
            gap += mesh.nodes[std::size_t(mesh.cells[std::size_t(member.cell)].node[std::size_t(k)])];
    EXPECT_GT(gap.x(), 0);  // at its +x side
    EXPECT_NEAR(gap.y(), 0, 1e-9);
}

TEST(WireMesh, ArcAndHelixKeepTheirLength) {
    Model model;
    Wire bent = line("bent", {{0, 0, 0}, {0.05, 0, 0}}, 1 * mm);
    std::get<WirePath>(bent.shape).pieces.emplace_back(WireArc{{0.05, 0.03, 0}, {0, 0, 1}, pi / 2});
    std::get<WirePath>(bent.shape).pieces.emplace_back(Vec3(0.08, 0.1, 0));
    Wire helix = line("helix", {}, 1 * mm, 2);
    helix.shape = WireHelix{{0.3, 0, 0}, 0.02, 0.01, 3, {0, 0, 1}};
    model.wires = {bent, helix};
    const Mesh mesh = meshed(model, 2);
    const double exact = 0.05 + 0.03 * pi / 2 + 0.07 + 3 * std::hypot(2 * pi * 0.02, 0.01);
    EXPECT_NEAR(length_of(mesh) / exact, 1, 2e-3);
}

int sharers_at(const Mesh& mesh, const Vec3& p) {
    int count = 0;
    for (const Cell& c : mesh.cells)
        for (int k = 0; k < 2; ++k)
            count += (mesh.nodes[std::size_t(c.node[std::size_t(k)])] - p).norm() < 1e-9 ? 1 : 0;
    return count;
}

TEST(WireMesh, EndsJoinEndsAndMiddles) {
    Model model;
    model.wires = {line("mast", {{0, 0, 0}, {0, 0, 0.1}}, 1 * mm), line("arm", {{0, 0, 0.06}, {0.05, 0, 0.06}}, 1 * mm),
                   line("top", {{0, 0, 0.1}, {0, 0.05, 0.1}}, 1 * mm)};
    const Mesh mesh = meshed(model);
    EXPECT_EQ(sharers_at(mesh, {0, 0, 0.06}), 3);
    EXPECT_EQ(sharers_at(mesh, {0, 0, 0.1}), 2);
    for (const Vec3& a : mesh.nodes)
        for (const Vec3& b : mesh.nodes) EXPECT_TRUE(&a == &b || (a - b).norm() > 1e-9);
}

TEST(WireMesh, GapAtAGroundedEndBeginsAtThePlane) {
    Model model;
    model.wires = {line("mast", {{0, 0, 0}, {0, 0, 0.07}}, 1 * mm)};
    model.ports = {port("feed", OnWire{"mast", 0, 3 * mm})};
    model.ground_plane_m = 0;
    const Mesh mesh = meshed(model);
    EXPECT_NEAR(mesh.ports[0].length_m, 3 * mm, 1e-12);
    EXPECT_EQ(mesh.nodes[0].z(), 0);
    EXPECT_EQ(mesh.ports[0].members[0].cell, 0);
}

TEST(WireMesh, WireAndFoilOfOneMaterialAreTwoConductors) {
    Model model;
    model.metals = {metal("line", box(0, 0, 100 * mm, 4 * mm))};
    model.wires = {line("mast", {{0, 0, 0.05}, {0, 0, 0.1}}, 1 * mm),
                   line("thin", {{0.1, 0, 0.05}, {0.1, 0, 0.1}}, 0.5 * mm)};
    for (Wire& w : model.wires) w.conductor = model.metals[0].conductor, w.conductor.thickness_m = 0;
    EXPECT_EQ(meshed(model).conductors.size(), 3U);
}

Model with_port(double at, double gap) {
    Model model;
    model.wires = {line("mast", {{0, 0, 0}, {0, 0, 0.1}}, 1 * mm)};
    model.ports = {port("feed", OnWire{"mast", at, gap})};
    return model;
}

TEST(WireFaults, GapsThatDoNotFit) {
    EXPECT_EQ(fault_of(with_port(0.5, 0.2)), "3: port 'feed' has a gap of 200 mm, longer than wire 'mast' of 100 mm\n");
    EXPECT_EQ(fault_of(with_port(0, 2 * mm)), "3: port 'feed' has a gap that reaches beyond the end of wire 'mast'\n");
    EXPECT_EQ(fault_of(with_port(0.5, 0)), "3: port 'feed' has a gap of no length\n");
    Model two = with_port(0.5, 4 * mm);
    two.lumped = {part("trim", OnWire{"mast", 0.52, 4 * mm})};
    EXPECT_EQ(fault_of(two), "4: part 'trim' overlaps the gap of port 'feed'\n");
    Model unknown = with_port(0.5, 4 * mm);
    unknown.ports[0].placement = OnWire{"pole", 0.5, 4 * mm};
    EXPECT_EQ(fault_of(unknown), "3: port 'feed' is on wire 'pole', which does not exist\n");
    Model joint = with_port(0.5, 4 * mm);
    joint.wires.push_back(line("arm", {{0, 0, 0.051}, {0.05, 0, 0.051}}, 1 * mm));
    EXPECT_EQ(fault_of(joint), "3: port 'feed' has a joint of wire 'mast' inside its gap\n");
}

TEST(WireFaults, CrossingWithoutAJoint) {
    Model model;
    model.wires = {line("mast", {{0, 0, 0}, {0, 0, 0.1}}, 1 * mm),
                   line("arm", {{-0.05, 1.5 * mm, 0.05}, {0.05, 1.5 * mm, 0.05}}, 1 * mm, 2)};
    EXPECT_EQ(
        fault_of(model),
        "2: wire 'arm' touches wire 'mast' (line 1) near (0, 0, 50) mm without a joint: the axes are 1.5 mm apart, "
        "the radii add up to 2 mm\n");
    Model loop;
    loop.wires = {line("knot", {{0, 0, 0}, {0.1, 0, 0}, {0.1, 0.1, 0}, {0.05, 0.1, 0}, {0.05, -0.1, 0}}, 1 * mm)};
    EXPECT_NE(fault_of(loop).find("wire 'knot' touches itself"), std::string::npos);
}

TEST(WireFaults, GroundAndBends) {
    Model model = with_port(0.5, 2 * mm);
    model.ground_plane_m = 0.02;
    EXPECT_EQ(fault_of(model), "1: wire 'mast' reaches 20 mm below the ground plane\n");
    Model lying;
    lying.wires = {line("radial", {{0, 0, 0}, {0.1, 0, 0}}, 1 * mm)};
    lying.ground_plane_m = 0;
    EXPECT_EQ(fault_of(lying), "1: wire 'radial' of radius 1 mm lies in the ground plane: its axis is 0 mm above it\n");
    Model tight;
    Wire bent = line("bent", {{0, 0, 0}, {0.05, 0, 0}}, 2 * mm);
    std::get<WirePath>(bent.shape).pieces.emplace_back(WireArc{{0.05, 3 * mm, 0}, {0, 0, 1}, pi});
    tight.wires = {bent};
    EXPECT_EQ(
        fault_of(tight),
        "1: wire 'bent' of radius 2 mm bends with a radius of 3 mm: a bend must be at least twice the radius of the "
        "wire\n");
}

TEST(WireFaults, TouchingMetal) {
    Model model;
    model.metals = {metal("line", box(0, 0, 100 * mm, 4 * mm))};
    model.wires = {line("lead", {{0, 0, 0}, {0, 0, 0.1}}, 1 * mm, 5)};
    EXPECT_EQ(fault_of(model), "5: wire 'lead' touches metal 'line': attaching a wire to metal is not yet possible\n");
}

}  // namespace
}  // namespace annulet::test
