// "Did you mean": what a mistyped command line may have meant.
#pragma once

#include <CLI/CLI.hpp>

#include <string>
#include <vector>

namespace annulet::app {

struct UsageFault {
    std::string message;
    std::string help;
};

/// The first unknown command or option among the arguments with the nearest known one; otherwise the parser's
/// own words.
UsageFault explain(const CLI::App& parser, const std::vector<std::string>& arguments, const CLI::ParseError& error);

}  // namespace annulet::app
