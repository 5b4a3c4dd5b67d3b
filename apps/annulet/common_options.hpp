// Options that every command takes, and what they stand for.
#pragma once

#include <annulet/core/progress.hpp>
#include <annulet/io/sweep_result.hpp>
#include <annulet/model/model.hpp>

#include <CLI/CLI.hpp>

#include <map>
#include <memory>
#include <string>
#include <vector>

namespace annulet::app {

struct CommonOptions {
    std::string model;
    std::string json;              ///< empty: beside the other files; "-": standard output
    std::string out;               ///< directory; empty: not given
    std::vector<std::string> set;  ///< NAME=VALUE
    int threads = 0;
    bool quiet = false;
    bool force = false;

    bool json_to_stdout() const { return json == "-"; }
    /// A result that goes to standard output whole leaves no files unless a directory for them is named.
    bool writes_files() const { return !json_to_stdout() || !out.empty(); }
    /// `name` in the output directory.
    std::string output_path(const std::string& name) const;
};

/// All of them; of a command without a model only those about its output.
void add_common_options(CLI::App& parser, CommonOptions& options);
void add_output_options(CLI::App& parser, CommonOptions& options);

/// A model read from its file with the `--set` parameters in force. Faults of the file are written to standard
/// error with the lines they stand in, then `Reported` is thrown.
struct LoadedModel {
    Model model;
    ResultOrigin origin;
    std::string stem;  ///< file name without directory and ending
};
LoadedModel load_model(const CommonOptions& options, const std::string& command);

/// Bad input that was already explained on standard error.
struct Reported {};

/// Sets the number of threads; shows progress on standard error when that is a terminal, and stops at Ctrl-C.
std::unique_ptr<Progress> begin_work(const CommonOptions& options);

/// Bytes a matrix may take: the physical memory, or less where the process is limited.
double memory_at_hand_bytes();

std::string program_version();

}  // namespace annulet::app
