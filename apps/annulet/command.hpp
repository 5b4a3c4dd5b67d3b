// A command of the program: options in, library call, result out. A new one is a file that defines a function
// returning its Command, and a line in `all_commands`.
#pragma once

#include <CLI/CLI.hpp>

#include <functional>
#include <memory>
#include <string>
#include <vector>

namespace annulet::app {

/// Exit statuses that scripts rely on.
enum ExitStatus { done = 0, answer_is_no = 1, bad_input = 2, numerics_failed = 3, file_failed = 4, interrupted = 130 };

struct Command {
    std::string name;
    std::string question;  ///< that it answers, one line
    /// Adds the options to the parser and returns what runs after parsing; it returns an exit status or throws.
    std::function<std::function<int()>(CLI::App&)> prepare;
};

Command check_command();
Command draw_command();
Command sweep_command();
Command prove_command();

inline std::vector<Command> all_commands() {
    return {check_command(), draw_command(), sweep_command(), prove_command()};
}

}  // namespace annulet::app
