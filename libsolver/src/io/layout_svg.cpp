#include <annulet/io/layout_svg.hpp>

#include <annulet/io/check_result.hpp>
#include <annulet/mesh/plan.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace annulet {
namespace {

constexpr double sheet_width_mm = 250;  // of the drawing on paper, about
constexpr double border_mm = 12;
constexpr double line_mm = 4.6;  // between lines of text
constexpr double text_mm = 3.4;

std::string escaped(const std::string& text) {
    std::string safe;
    for (const char c : text) {
        switch (c) {
            case '&':
                safe += "&amp;";
                break;
            case '<':
                safe += "&lt;";
                break;
            case '>':
                safe += "&gt;";
                break;
            case '"':
                safe += "&quot;";
                break;
            default:
                safe += c;
        }
    }
    return safe;
}

/// The largest of 1, 2, 5 times a power of ten not above `limit`.
double round_below(double limit) {
    const double decade = std::pow(10, std::floor(std::log10(limit)));
    for (const double digit : {5.0, 2.0})
        if (digit * decade <= limit) return digit * decade;
    return decade;
}

const char* const metal_fills[] = {"#8a8a8a", "url(#dots)", "url(#waves)", "url(#squares)"};
const char* const patterns = R"svg(<defs>
<pattern id="hatch" width="2.4" height="2.4" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
<rect width="2.4" height="2.4" fill="#f4f0e4"/><line x1="0" y1="0" x2="0" y2="2.4" stroke="#b8ae90" stroke-width="0.3"/></pattern>
<pattern id="dots" width="1.6" height="1.6" patternUnits="userSpaceOnUse"><rect width="1.6" height="1.6" fill="#d8d8d8"/>
<circle cx="0.8" cy="0.8" r="0.35" fill="#333"/></pattern>
<pattern id="waves" width="2" height="2" patternUnits="userSpaceOnUse"><rect width="2" height="2" fill="#c0c0c0"/>
<path d="M0 1 L1 0 L2 1" fill="none" stroke="#222" stroke-width="0.25"/></pattern>
<pattern id="squares" width="2" height="2" patternUnits="userSpaceOnUse"><rect width="2" height="2" fill="#e8e8e8"/>
<rect x="0.4" y="0.4" width="1" height="1" fill="none" stroke="#222" stroke-width="0.2"/></pattern>
</defs>
)svg";

class Drawer {
public:
    Drawer(const Model& model, const std::vector<PlacedFinding>& findings, const Mesh* mesh)
        : model_(model), findings_(findings), mesh_(mesh), planes_(metal_planes(model)) {}

    std::string drawn() {
        set_frame();
        for (const Laminate& laminate : model_.laminates)
            region(sheet_region(model_, laminate), "url(#hatch)", "stroke=\"#6b6248\" stroke-width=\"0.35\"");
        for (std::size_t k = 0; k < planes_.size(); ++k)
            region(planes_[k].region, fill(k), "stroke=\"#111\" stroke-width=\"0.25\"");
        if (mesh_ != nullptr) cells();
        for (const Via& via : model_.vias) mark_via(via);
        int number = 0;
        for (const Port& port : model_.ports) place(fmt::format("P{} {}", ++number, port.name), port.placement);
        number = 0;
        for (const Lumped& part : model_.lumped) place(fmt::format("L{} {}", ++number, part.name), part.placement);
        for (std::size_t k = 0; k < findings_.size(); ++k) violation(k);
        legend();
        return head() + body_ + "</svg>\n";
    }

private:
    static const char* fill(std::size_t plane) { return metal_fills[std::min<std::size_t>(plane, 3)]; }

    void set_frame() {
        Loops2 all;
        for (const MetalPlane& plane : planes_) all.insert(all.end(), plane.region.begin(), plane.region.end());
        for (const Laminate& laminate : model_.laminates) {
            const Loops2 sheet = sheet_region(model_, laminate);
            all.insert(all.end(), sheet.begin(), sheet.end());
        }
        if (all.empty()) all.push_back({Vec2(-0.01, -0.01), Vec2(0.01, 0.01)});
        box_ = box_of(all);
        const Vec2 size = (box_.high - box_.low) * 1e3;
        const double wanted = sheet_width_mm / std::max(size.maxCoeff(), 1e-3);
        scale_ = wanted >= 1 ? round_below(wanted) : 1 / std::ceil(1 / wanted);
        drawing_ = size * scale_;
        y_ = drawing_.y() + 2 * border_mm;
    }

    Vec2 on_paper(const Vec2& p) const {
        return {border_mm + (p.x() - box_.low.x()) * 1e3 * scale_, border_mm + (box_.high.y() - p.y()) * 1e3 * scale_};
    }

    std::string points(const Loop& loop, const char* command) const {
        std::string text;
        for (std::size_t i = 0; i < loop.size(); ++i) {
            const Vec2 p = on_paper(loop[i]);
            text += fmt::format("{}{:.3f} {:.3f}", i == 0 ? "M" : command, p.x(), p.y());
        }
        return text + "Z";
    }

    void region(const Loops2& loops, const char* paint, const char* style) {
        if (loops.empty()) return;
        std::string path;
        for (const Loop& loop : loops) path += points(loop, "L");
        body_ += fmt::format("<path d=\"{}\" fill=\"{}\" fill-rule=\"evenodd\" {}/>\n", path, paint, style);
    }

    void cells() {
        std::string path;
        for (const SheetMesh& sheet : mesh_->sheets)
            for (const SheetMesh::Column& column : sheet.columns) {
                Loop loop;
                for (const int node : column.node)
                    if (node >= 0) loop.push_back(sheet.plan[static_cast<std::size_t>(node)]);
                path += points(loop, "L");
            }
        for (const Cell& cell : mesh_->cells) {
            Loop loop;
            for (int i = 0; i < cell.corners(); ++i)
                loop.push_back(
                    mesh_->nodes[static_cast<std::size_t>(cell.node[static_cast<std::size_t>(i)])].head<2>());
            path += points(loop, "L");
        }
        body_ += fmt::format("<path d=\"{}\" fill=\"none\" stroke=\"#000\" stroke-width=\"0.1\"/>\n", path);
    }

    void mark_via(const Via& via) {
        const Vec2 p = on_paper(via.at);
        const double radius = std::max(0.5 * via.diameter_m * 1e3 * scale_, 0.6);
        body_ += fmt::format(
            "<circle cx=\"{0:.3f}\" cy=\"{1:.3f}\" r=\"{2:.3f}\" fill=\"#fff\" stroke=\"#000\" "
            "stroke-width=\"0.4\"/><circle cx=\"{0:.3f}\" cy=\"{1:.3f}\" r=\"0.3\"/>\n",
            p.x(), p.y(), radius);
    }

    // Beside the layout where there is room: away from its centre.
    void text_beside(const Vec2& at, const std::string& text) {
        const Vec2 centre = on_paper(0.5 * (box_.low + box_.high));
        const bool right = at.x() < centre.x();
        const Vec2 foot(at.x() + (right ? 9 : -9), at.y() - 7);
        body_ += fmt::format(
            "<line x1=\"{:.2f}\" y1=\"{:.2f}\" x2=\"{:.2f}\" y2=\"{:.2f}\" stroke=\"#000\" "
            "stroke-width=\"0.3\"/>\n",
            at.x(), at.y(), foot.x(), foot.y());
        body_ += fmt::format("<text x=\"{:.2f}\" y=\"{:.2f}\" text-anchor=\"{}\" class=\"label\">{}</text>\n",
                             foot.x() + (right ? 0.8 : -0.8), foot.y() - 0.6, right ? "start" : "end", escaped(text));
    }

    void place(const std::string& name, const Placement& placement) {
        const Loop outline = placement_outline(placement);
        if (outline.empty()) return;
        region({outline}, "#ffffff", "stroke=\"#000\" stroke-width=\"0.5\"");
        const Vec2 a = on_paper(outline[0]), c = on_paper(outline[2]), b = on_paper(outline[1]),
                   d = on_paper(outline[3]);
        body_ += fmt::format(
            "<path d=\"M{:.3f} {:.3f}L{:.3f} {:.3f}M{:.3f} {:.3f}L{:.3f} {:.3f}\" stroke=\"#000\" "
            "stroke-width=\"0.25\"/>\n",
            a.x(), a.y(), c.x(), c.y(), b.x(), b.y(), d.x(), d.y());
        text_beside(0.5 * (a + c), name);
    }

    void violation(std::size_t k) {
        const RuleFinding& rule = findings_[k].rule;
        region({rule.place}, "#ffffff",
               "fill-opacity=\"0.6\" stroke=\"#000\" stroke-width=\"0.3\" stroke-dasharray=\"0.8 0.5\"");
        const Vec2 p = on_paper(rule.at);
        body_ += fmt::format(
            "<circle cx=\"{:.3f}\" cy=\"{:.3f}\" r=\"3\" fill=\"none\" stroke=\"#b00000\" "
            "stroke-width=\"0.8\"/>\n",
            p.x(), p.y());
        body_ += fmt::format("<text x=\"{:.3f}\" y=\"{:.3f}\" class=\"label\" font-weight=\"bold\">!{}</text>\n",
                             p.x() + 3.4, p.y() + 1.2, k + 1);
    }

    void line(const std::string& text, const char* sample = nullptr) {
        if (sample != nullptr)
            body_ += fmt::format(
                "<rect x=\"{}\" y=\"{:.2f}\" width=\"7\" height=\"3.4\" fill=\"{}\" stroke=\"#000\" "
                "stroke-width=\"0.25\"/>\n",
                border_mm, y_ - 3, sample);
        body_ += fmt::format("<text x=\"{:.2f}\" y=\"{:.2f}\" class=\"label\">{}</text>\n",
                             border_mm + (sample != nullptr ? 9.0 : 0.0), y_, escaped(text));
        widest_ = std::max(widest_, 0.55 * text_mm * static_cast<double>(text.size()) + 9);
        y_ += line_mm;
    }

    void legend() {
        const double bar = round_below(0.4 * drawing_.x() / scale_);
        body_ += fmt::format(
            "<path d=\"M{0:.2f} {1:.2f}v-2v4v-2h{2:.3f}v-2v4\" fill=\"none\" stroke=\"#000\" "
            "stroke-width=\"0.5\"/>\n",
            border_mm, y_, bar * scale_);
        body_ += fmt::format("<text x=\"{:.2f}\" y=\"{:.2f}\" class=\"label\">{:g} mm, drawn {}</text>\n",
                             border_mm + bar * scale_ + 3, y_ + 1.2, bar,
                             scale_ >= 1 ? fmt::format("{:g} : 1", scale_) : fmt::format("1 : {:g}", 1 / scale_));
        y_ += 2 * line_mm;
        line(model_.title);
        for (const Laminate& laminate : model_.laminates)
            line(fmt::format("laminate '{}', {:.4g} mm, top at {:.4g} mm", laminate.name, laminate.thickness_m * 1e3,
                             laminate.top_m * 1e3),
                 "url(#hatch)");
        for (std::size_t k = 0; k < planes_.size(); ++k) {
            std::string names;
            for (const std::string& name : planes_[k].names) names += (names.empty() ? "" : ", ") + name;
            line(fmt::format("metal at {:.4g} mm: {}", planes_[k].plane_m * 1e3, names), fill(k));
        }
        line("crossed boxes: ports P and parts L");
        for (std::size_t k = 0; k < findings_.size(); ++k)
            line(fmt::format("!{}  {}", k + 1, finding_text(findings_[k])));
    }

    std::string head() const {
        const double width = std::max(drawing_.x() + 2 * border_mm, widest_ + 2 * border_mm),
                     height = y_ + border_mm / 2;
        return layout_svg_marker() +
               fmt::format(
                   "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"{0:.2f}mm\" height=\"{1:.2f}mm\" "
                   "viewBox=\"0 0 {0:.2f} {1:.2f}\">\n<title>{2}</title>\n<style>.label{{font:{3}px sans-serif;"
                   "fill:#000;paint-order:stroke;stroke:#fff;stroke-width:0.8px}}</style>\n{4}"
                   "<rect width=\"100%\" height=\"100%\" fill=\"#fff\"/>\n",
                   width, height, escaped(model_.title), text_mm, patterns);
    }

    const Model& model_;
    const std::vector<PlacedFinding>& findings_;
    const Mesh* mesh_;
    std::vector<MetalPlane> planes_;
    Box box_;
    double scale_ = 1;
    Vec2 drawing_{0, 0};
    double y_ = 0, widest_ = 0;
    std::string body_;
};

}  // namespace

std::string layout_svg_marker() {
    return "<!-- layout drawn by annulet -->\n";
}

std::string layout_svg(const Model& model, const std::vector<PlacedFinding>& findings, const Mesh* mesh) {
    return Drawer(model, findings, mesh).drawn();
}

}  // namespace annulet
