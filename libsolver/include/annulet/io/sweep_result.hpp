// What a sweep found, as JSON, CSV and Touchstone for programs and as a summary for people.
#pragma once

#include <annulet/study/solve.hpp>

#include <string>

namespace annulet {

/// What a result came from.
struct ResultOrigin {
    std::string version;  ///< of annulet
    std::string command;  ///< "sweep", ...
    std::string file;     ///< as the user named it
    std::string sha256;   ///< of the model's text
};

/// JSON, keys with units in their names; values that do not exist (infinite VSWR, no estimate) are null.
std::string sweep_json(const SolvedModel& solved, const ResultOrigin& origin);

/// RFC 4180 [RFC4180], one row per frequency and port; `sweep_csv_header` is the first line, always the same.
std::string sweep_csv(const SolvedModel& solved);
std::string sweep_csv_header();

/// See touchstone.hpp; the comments name the model.
std::string sweep_touchstone(const SolvedModel& solved, const ResultOrigin& origin);

/// Title, mesh, ports with their resonances, goal, figures of quality, cautions: lines of at most 100 columns.
std::string sweep_summary(const SolvedModel& solved, const ResultOrigin& origin);

/// Text that the first lines of each kind of file carry; see OutputFile.
std::string json_marker();
std::string touchstone_marker();

/// "868.3 MHz": value with the prefix that keeps it between 1 and 1000.
std::string engineering(double value, const std::string& unit, int digits = 4);

}  // namespace annulet
