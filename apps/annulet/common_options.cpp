#include "common_options.hpp"

#include "terminal.hpp"

#include <annulet/core/diagnostics.hpp>
#include <annulet/io/sha256.hpp>
#include <annulet/io/text_file.hpp>
#include <annulet/model/drawing.hpp>

#include <fmt/format.h>
#include <omp.h>
#include <sys/resource.h>
#include <unistd.h>

#include <algorithm>
#include <cstdio>
#include <filesystem>

namespace annulet::app {
namespace {

constexpr int most_threads = 1024;

std::map<std::string, std::string> settings(const std::vector<std::string>& pairs) {
    std::map<std::string, std::string> result;
    for (const auto& pair : pairs) {
        const auto sign = pair.find('=');
        if (sign == std::string::npos || sign == 0)
            throw InputError({Diagnostic{Severity::error,
                                         {},
                                         fmt::format("--set {}: there is no NAME=VALUE", pair),
                                         "for example --set radius=54.9 or --set 'width=8 mm'"}});
        result[pair.substr(0, sign)] = pair.substr(sign + 1);
    }
    return result;
}

}  // namespace

std::string CommonOptions::output_path(const std::string& name) const {
    return (std::filesystem::path(out.empty() ? "." : out) / name).lexically_normal().string();
}

void add_common_options(CLI::App& parser, CommonOptions& options) {
    parser.add_option("MODEL", options.model, "Model file (TOML)")->required();
    parser.add_option("--set", options.set, "Override a parameter of the model (repeatable)")
        ->type_name("NAME=VALUE")
        ->allow_extra_args(false);
    add_output_options(parser, options);
}

void add_output_options(CLI::App& parser, CommonOptions& options) {
    parser.add_option("--json", options.json, "Write the JSON result to FILE; - is standard output")->type_name("FILE");
    parser.add_option("--out", options.out, "Directory for the files (default: the current one)")->type_name("DIR");
    parser.add_option("--threads", options.threads, "Number of threads (default: all processors)")
        ->type_name("N")
        ->check(CLI::Range(1, most_threads));
    parser.add_flag("--quiet", options.quiet, "Print nothing but errors and the JSON asked for with --json -");
    parser.add_flag("--force", options.force, "Overwrite files that annulet did not write");
}

LoadedModel load_model(const CommonOptions& options, const std::string& command) {
    const auto text = read_text(options.model);
    const auto set = settings(options.set);
    try {
        auto model = evaluate(read_drawing(text, options.model), set);
        return {std::move(model),
                {ANNULET_VERSION, command, options.model, sha256(text)},
                std::filesystem::path(options.model).stem().string()};
    } catch (const InputError& error) {
        report_faults(error, options.model, text);
        throw Reported{};
    }
}

std::unique_ptr<Progress> begin_work(const CommonOptions& options) {
    if (options.threads > 0) omp_set_num_threads(options.threads);
    return make_progress(!options.quiet && ::isatty(STDERR_FILENO) != 0);
}

double memory_at_hand_bytes() {
    const double physical =
        static_cast<double>(::sysconf(_SC_PHYS_PAGES)) * static_cast<double>(::sysconf(_SC_PAGESIZE));
    rlimit limit{};
    if (::getrlimit(RLIMIT_AS, &limit) != 0 || limit.rlim_cur == RLIM_INFINITY) return physical;
    return std::min(physical, static_cast<double>(limit.rlim_cur));
}

std::string program_version() {
    return fmt::format("annulet {} ({}, {})", ANNULET_VERSION, ANNULET_BUILD_TYPE, ANNULET_COMPILER);
}

}  // namespace annulet::app
