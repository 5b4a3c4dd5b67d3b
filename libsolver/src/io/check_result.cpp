#include <annulet/io/check_result.hpp>

#include <annulet/core/constants.hpp>

#include <fmt/format.h>
#include <nlohmann/json.hpp>

#include "io/json_text.hpp"

namespace annulet {
namespace {

using Json = nlohmann::ordered_json;

const char* kind_of(const RuleFinding& rule) {
    switch (rule.kind) {
        case RuleFinding::Kind::slot:
            return "slot";
        case RuleFinding::Kind::web:
            return "web";
        case RuleFinding::Kind::inner_corner:
            break;
    }
    return "inner corner";
}

double degrees(double radians) {
    return radians * 180 / constants::pi;
}

}  // namespace

std::string finding_text(const PlacedFinding& finding) {
    const RuleFinding& rule = finding.rule;
    const bool corner = rule.kind == RuleFinding::Kind::inner_corner;
    return fmt::format("{} of {}{:.3g} mm at ({:.2f}, {:.2f}) mm, below the {:.3g} mm {}, on {}", kind_of(rule),
                       corner ? "radius " : "", rule.measured_m * 1e3, rule.at.x() * 1e3, rule.at.y() * 1e3,
                       rule.rule_m * 1e3, corner ? "of the bit" : "allowed", finding.layer);
}

std::string check_text(const Model& model, const CheckReport& report) {
    const MeshQuality& mesh = report.quality;
    std::string text = model.title + "\n";
    text += fmt::format("{:<12}{} unknowns on {} quadrilaterals, {} triangles, {} segments\n", "Mesh",
                        mesh.interior_edges, mesh.quadrilaterals, mesh.triangles, mesh.segments);
    if (report.laminate_cells > 0)
        text += fmt::format("{:<12}{} cells of laminate, {} unknowns more\n", "", report.laminate_cells,
                            report.laminate_unknowns);
    text += fmt::format("{:<12}edges {:.3g} to {:.3g} mm, angles {:.1f} to {:.1f} degrees\n", "",
                        mesh.smallest_edge_m * 1e3, mesh.largest_edge_m * 1e3, degrees(mesh.smallest_angle_rad),
                        degrees(mesh.largest_angle_rad));
    if (report.top_frequency_hz > 0)
        text += fmt::format("{:<12}longest edge {:.1f} to the wavelength at {}\n", "", report.cells_per_wavelength,
                            engineering(report.top_frequency_hz, "Hz"));
    text += fmt::format("{:<12}{:.3g} MB for the matrix\n", "Memory", report.matrix_memory_bytes / 1e6);
    for (const std::string& caution : report.electrical) text += fmt::format("{:<12}{}\n", "Caution", caution);
    for (const PlacedFinding& finding : report.findings)
        text += fmt::format("{:<12}{}\n", "Rule", finding_text(finding));
    const bool any =
        model.fabrication.minimum_slot_m || model.fabrication.minimum_web_m || model.fabrication.tool_radius_m;
    text += fmt::format("{:<12}{}\n", "Verdict",
                        !report.passed() ? fmt::format("{} places break the fabrication rules", report.findings.size())
                        : any            ? "can be built by the rules given, and solved"
                                         : "can be solved; no rules of fabrication are given");
    return text;
}

std::string check_json(const Model& model, const CheckReport& report, const ResultOrigin& origin) {
    const MeshQuality& mesh = report.quality;
    Json findings = Json::array();
    for (const PlacedFinding& finding : report.findings)
        findings.push_back({{"kind", kind_of(finding.rule)},
                            {"layer", finding.layer},
                            {"at_m", {finding.rule.at.x(), finding.rule.at.y()}},
                            {"measured_m", finding.rule.measured_m},
                            {"rule_m", finding.rule.rule_m}});
    const Json result{{"annulet", origin.version},
                      {"command", origin.command},
                      {"model", {{"title", model.title}, {"file", origin.file}, {"sha256", origin.sha256}}},
                      {"parameters", model.parameters_si},
                      {"mesh",
                       {{"unknowns", mesh.interior_edges},
                        {"quadrilaterals", mesh.quadrilaterals},
                        {"triangles", mesh.triangles},
                        {"segments", mesh.segments},
                        {"laminate_cells", report.laminate_cells},
                        {"laminate_unknowns", report.laminate_unknowns},
                        {"smallest_angle_deg", degrees(mesh.smallest_angle_rad)},
                        {"largest_angle_deg", degrees(mesh.largest_angle_rad)},
                        {"smallest_edge_m", mesh.smallest_edge_m},
                        {"largest_edge_m", mesh.largest_edge_m},
                        {"cells_per_wavelength", report.cells_per_wavelength}}},
                      {"cautions", report.electrical},
                      {"matrix_memory_bytes", report.matrix_memory_bytes},
                      {"findings", findings},
                      {"passed", report.passed()}};
    return json_text(result);
}

}  // namespace annulet
