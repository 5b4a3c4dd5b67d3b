// Sheets under test: laminates in a line, and what every sheet must be.
#pragma once

#include "mesh_support.hpp"

#include <annulet/geometry/boolean.hpp>

#include "mesh/plan_border.hpp"

#include <cstdlib>
#include <fstream>

namespace annulet::test {

inline Laminate sheet(const std::string& name, Shape outline, double top, double thickness) {
    Laminate laminate;
    laminate.name = name;
    laminate.top_m = top;
    laminate.thickness_m = thickness;
    laminate.permittivity = {{1e9, 4.3}};
    laminate.outline = std::move(outline);
    laminate.where = {9, 1};
    return laminate;
}

inline MeshOptions at_frequency(double top_hz, double refine = 1) {
    MeshOptions options;
    options.top_frequency_hz = top_hz;
    options.refine = refine;
    return options;
}

inline Loop plan_of(const SheetMesh& sheet, const SheetMesh::Column& column) {
    Loop loop;
    for (const int node : column.node)
        if (node >= 0) loop.push_back(sheet.plan[static_cast<std::size_t>(node)]);
    return loop;
}

inline double plan_area(const SheetMesh& sheet) {
    double sum = 0;
    for (const auto& column : sheet.columns) sum += signed_area(plan_of(sheet, column));
    return sum;
}

/// Smallest corner angle over the triangles, degrees.
inline double smallest_triangle_angle(const SheetMesh& sheet) {
    double least = 180;
    for (const auto& column : sheet.columns) {
        const Loop p = plan_of(sheet, column);
        for (std::size_t i = 0; p.size() == 3 && i < 3; ++i) {
            const Vec2 a = p[(i + 1) % 3] - p[i], b = p[(i + 2) % 3] - p[i];
            least = std::min(least, std::atan2(cross(a, b), a.dot(b)) * 180 / pi);
        }
    }
    return least;
}

/// For looking at: with SHEET_SVG=DIRECTORY in the environment each sheet is drawn there.
inline void draw_if_asked(const Mesh& mesh, const SheetMesh& sheet) {
    const char* directory = std::getenv("SHEET_SVG");
    if (directory == nullptr) return;
    const auto* test = testing::UnitTest::GetInstance()->current_test_info();
    std::ofstream svg(std::string(directory) + "/" + test->name() + "_" + std::to_string(&sheet - mesh.sheets.data()) +
                      ".svg");
    const Box box = box_of(std::span(&sheet.plan, 1));
    const Vec2 size = (box.high - box.low) * 1e3;
    svg << "<svg xmlns='http://www.w3.org/2000/svg' width='1200' viewBox='" << box.low.x() * 1e3 << " "
        << -box.high.y() * 1e3 << " " << size.x() << " " << size.y() << "'>\n";
    for (std::size_t k = 0; k < sheet.columns.size(); ++k) {
        const bool metal = (!sheet.metal_on_top.empty() && sheet.metal_on_top[k] >= 0) ||
                           (!sheet.metal_on_bottom.empty() && sheet.metal_on_bottom[k] >= 0);
        svg << "<polygon fill='" << (metal ? "#e0a060" : "#f0fff0") << "' stroke='black' stroke-width='"
            << size.x() / 2000 << "' points='";
        for (const Vec2& p : plan_of(sheet, sheet.columns[k])) svg << p.x() * 1e3 << "," << -p.y() * 1e3 << " ";
        svg << "'/>\n";
    }
    svg << "</svg>\n";
}

/// Columns counter-clockwise and convex, conforming, all points used; a metal cell on a column has its corners.
inline void expect_sound_sheet(const Mesh& mesh, const SheetMesh& sheet, std::size_t most_loops = 1) {
    draw_if_asked(mesh, sheet);
    std::map<std::pair<int, int>, int> directed;
    std::set<int> used;
    for (std::size_t k = 0; k < sheet.columns.size(); ++k) {
        const auto& column = sheet.columns[k];
        const Loop loop = plan_of(sheet, column);
        const std::size_t n = loop.size();
        ASSERT_EQ(n, column.kind == CellKind::quadrilateral ? 4u : 3u);
        for (std::size_t i = 0; i < n; ++i) {
            EXPECT_GT(cross(loop[(i + 1) % n] - loop[i], loop[(i + n - 1) % n] - loop[i]), 0.0);
            EXPECT_EQ(++directed[std::make_pair(column.node[i], column.node[(i + 1) % n])], 1);
            used.insert(column.node[i]);
        }
        for (const auto* face : {&sheet.metal_on_top, &sheet.metal_on_bottom}) {
            if (face->empty() || (*face)[k] < 0) continue;
            const Cell& cell = mesh.cells[static_cast<std::size_t>((*face)[k])];
            const double z = face == &sheet.metal_on_top ? sheet.level_m.back() : sheet.level_m.front();
            for (int i = 0; i < cell.corners(); ++i) {
                const Vec3 p = mesh.nodes[static_cast<std::size_t>(cell.node[static_cast<std::size_t>(i)])];
                EXPECT_NEAR(p.z(), z, 1e-9);
                EXPECT_TRUE(std::find(loop.begin(), loop.end(), Vec2(p.head<2>())) != loop.end());
            }
        }
    }
    EXPECT_EQ(used.size(), sheet.plan.size());
    // The outline of the columns, by what they do not share, encloses their area once.
    const std::vector<Loop> border = border_loops(sheet.columns, sheet.plan);
    EXPECT_NEAR(area_of(united(border)) / plan_area(sheet), 1.0, 1e-5) << "columns overlap or do not share their edges";
    EXPECT_LE(border.size(), most_loops);
}

inline int covered_cells(const std::vector<int>& face) {
    return static_cast<int>(std::count_if(face.begin(), face.end(), [](int cell) { return cell >= 0; }));
}

}  // namespace annulet::test
