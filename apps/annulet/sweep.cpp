#include "command.hpp"
#include "common_options.hpp"
#include "terminal.hpp"

#include <annulet/core/units.hpp>
#include <annulet/io/sweep_result.hpp>
#include <annulet/io/text_file.hpp>
#include <annulet/io/touchstone.hpp>
#include <annulet/study/converge.hpp>

#include <fmt/format.h>

namespace annulet::app {
namespace {

struct SweepOptionsGiven {
    CommonOptions common;
    std::string from, to;
    int points = 0;
    std::vector<std::string> at;
    bool every_point = false;
    bool in_air = false;
};

void add_options(CLI::App& parser, SweepOptionsGiven& given) {
    add_common_options(parser, given.common);
    parser.add_option("--from", given.from, "First frequency, such as '500 MHz' (a bare number is in hertz)")
        ->type_name("FREQUENCY");
    parser.add_option("--to", given.to, "Last frequency")->type_name("FREQUENCY");
    parser.add_option("--points", given.points, "Number of frequencies")
        ->type_name("N")
        ->check(CLI::Range(1, 1'000'000));
    parser.add_option("--at", given.at, "A single frequency instead of a range (repeatable)")
        ->type_name("FREQUENCY")
        ->allow_extra_args(false)
        ->excludes("--from", "--to", "--points");
    parser.add_flag("--every-point", given.every_point,
                    "Fill and factorise exactly at every point: slow, to check the sweep against");
    parser.add_flag("--in-air", given.in_air, "Leave the laminates out, to see what the board does to the antenna");
}

FrequencyChoice frequencies(const SweepOptionsGiven& given) {
    FrequencyChoice choice;
    if (!given.from.empty()) choice.from_hz = parse_quantity(given.from, kinds::frequency, "--from");
    if (!given.to.empty()) choice.to_hz = parse_quantity(given.to, kinds::frequency, "--to");
    if (given.points > 0) choice.points = given.points;
    for (const auto& text : given.at) choice.at_hz.push_back(parse_quantity(text, kinds::frequency, "--at"));
    return choice;
}

/// The files of a sweep with their paths and markers, still empty: table, Touchstone, JSON.
std::vector<OutputFile> planned_files(const CommonOptions& options, const LoadedModel& loaded) {
    std::vector<OutputFile> files;
    if (options.writes_files()) {
        const auto touchstone = loaded.stem + touchstone_extension(loaded.model.ports.size());
        files.push_back({options.output_path(touchstone), "", touchstone_marker()});
        files.push_back({options.output_path(loaded.stem + ".csv"), "", sweep_csv_header()});
    }
    if (!options.json_to_stdout())
        files.push_back(
            {options.json.empty() ? options.output_path(loaded.stem + ".json") : options.json, "", json_marker()});
    return files;
}

std::string fill(std::vector<OutputFile>& files, const CommonOptions& options, const SolvedModel& solved,
                 const ResultOrigin& origin) {
    const auto json = sweep_json(solved, origin);
    if (options.writes_files()) {
        files[0].content = sweep_touchstone(solved, origin);
        files[1].content = sweep_csv(solved);
    }
    if (!options.json_to_stdout()) files.back().content = json;
    return json;
}

std::string closing_lines(const std::vector<OutputFile>& files, const Timing& timing) {
    std::string text = fmt::format("{:<12}{:.2f} s\n", "Time", timing.total_s);
    for (const auto& file : files) text += fmt::format("{:<12}{}\n", &file == files.data() ? "Files" : "", file.path);
    return text;
}

int run(const SweepOptionsGiven& given) {
    const auto& options = given.common;
    SolveOptions solve;
    solve.frequencies = frequencies(given);
    solve.memory_limit_bytes = memory_at_hand_bytes();
    solve.threads = options.threads;
    solve.every_point = given.every_point;

    auto loaded = load_model(options, "sweep");
    const bool sheets_left_out = given.in_air && !loaded.model.laminates.empty();
    if (given.in_air) loaded.model.laminates.clear();
    auto files = planned_files(options, loaded);
    check_writable(files, options.force);

    auto progress = begin_work(options);
    auto solved = given.every_point ? solve_model(std::move(loaded.model), solve, progress.get())
                                    : solve_with_error_bars(loaded.model, solve, {}, progress.get());
    if (sheets_left_out)
        solved.cautions.push_back("solved in air as asked: on the real board every resonance lies lower");
    const auto json = fill(files, options, solved, loaded.origin);
    checkpoint(progress.get(), "write", 0, 0);
    progress.reset();

    write_files(files, options.force);
    if (options.json_to_stdout())
        print(json);
    else if (!options.quiet)
        print(sweep_summary(solved, loaded.origin) + closing_lines(files, solved.timing));
    return done;
}

}  // namespace

Command sweep_command() {
    return {"sweep", "What is the impedance over frequency? Z, S11, VSWR, resonances, bandwidth", [](CLI::App& parser) {
                auto given = std::make_shared<SweepOptionsGiven>();
                add_options(parser, *given);
                return [given] { return run(*given); };
            }};
}

}  // namespace annulet::app
