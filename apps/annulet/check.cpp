#include "command.hpp"
#include "common_options.hpp"
#include "terminal.hpp"

#include <annulet/io/check_result.hpp>
#include <annulet/io/text_file.hpp>

namespace annulet::app {
namespace {

int run(const CommonOptions& options) {
    const auto loaded = load_model(options, "check");
    MeshOptions mesh_options = check_mesh_options(loaded.model);
    const auto report = check_model(loaded.model, make_mesh(loaded.model, mesh_options), mesh_options.top_frequency_hz);
    const auto json = check_json(loaded.model, report, loaded.origin);
    if (options.json_to_stdout())
        print(json);
    else if (!options.quiet)
        print(check_text(loaded.model, report));
    if (!options.json.empty() && !options.json_to_stdout())
        write_files({{options.json, json, json_marker()}}, options.force);
    return report.passed() ? done : answer_is_no;
}

}  // namespace

Command check_command() {
    return {"check", "Can this be built and solved? Rules of fabrication, mesh figures; solves nothing",
            [](CLI::App& parser) {
                auto options = std::make_shared<CommonOptions>();
                add_common_options(parser, *options);
                return [options] { return run(*options); };
            }};
}

}  // namespace annulet::app
