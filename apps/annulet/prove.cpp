#include "command.hpp"
#include "common_options.hpp"
#include "terminal.hpp"

#include <annulet/io/prove_result.hpp>
#include <annulet/io/text_file.hpp>

namespace annulet::app {
namespace {

int run(const CommonOptions& options) {
    std::vector<OutputFile> files;
    if (!options.json.empty() && !options.json_to_stdout())
        files.push_back({options.output_path(options.json), "", json_marker()});
    check_writable(files, options.force);
    auto progress = begin_work(options);
    const auto report = prove(progress.get());
    progress.reset();
    const auto json = prove_json(report, ANNULET_VERSION);
    if (!files.empty()) files[0].content = json;
    write_files(files, options.force);
    if (options.json_to_stdout())
        print(json);
    else if (!options.quiet)
        print(prove_table(report));
    return report.pass() ? done : answer_is_no;
}

}  // namespace

Command prove_command() {
    return {"prove", "May I trust this build? The regression table against outside results, pass or fail",
            [](CLI::App& parser) {
                auto options = std::make_shared<CommonOptions>();
                add_output_options(parser, *options);
                return [options] { return run(*options); };
            }};
}

}  // namespace annulet::app
