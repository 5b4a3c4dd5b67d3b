#include "command.hpp"
#include "common_options.hpp"
#include "terminal.hpp"

#include <annulet/io/layout_svg.hpp>
#include <annulet/io/text_file.hpp>

#include <fmt/format.h>

namespace annulet::app {
namespace {

struct DrawOptions {
    CommonOptions common;
    bool mesh = false;
};

int run(const DrawOptions& given) {
    const auto& options = given.common;
    const auto loaded = load_model(options, "draw");
    Mesh mesh;
    if (given.mesh) mesh = make_mesh(loaded.model, check_mesh_options(loaded.model));
    const auto findings = rule_findings(loaded.model);
    const auto path = options.output_path(loaded.stem + ".svg");
    write_files({{path, layout_svg(loaded.model, findings, given.mesh ? &mesh : nullptr), layout_svg_marker()}},
                options.force);
    if (!options.quiet) print(fmt::format("{:<12}{}\n", "Drawn", path));
    return done;
}

}  // namespace

Command draw_command() {
    return {"draw", "Is this the thing I meant? An SVG of metal, laminate, ports and parts", [](CLI::App& parser) {
                auto given = std::make_shared<DrawOptions>();
                add_common_options(parser, given->common);
                parser.add_flag("--mesh", given->mesh, "Draw the cells as well");
                return [given] { return run(*given); };
            }};
}

}  // namespace annulet::app
