// What the person at the terminal sees and presses.
#pragma once

#include <annulet/core/diagnostics.hpp>
#include <annulet/core/progress.hpp>

#include <memory>
#include <string>

namespace annulet::app {

/// From now on Ctrl-C (and a request to terminate) only asks the work to stop; a second one ends the program at once.
void catch_interrupts();

/// Progress that ends the work when interrupted, and shows it on standard error if `visible`.
std::unique_ptr<Progress> make_progress(bool visible);

/// Writes each fault to standard error with its line of `text`.
void report_faults(const InputError& error, const std::string& file, const std::string& text);

/// `annulet: error: message` on standard error.
void report_error(const std::string& message, const std::string& help = "");

/// Writes to standard output; throws FileError where it is closed or full.
void print(const std::string& text);

}  // namespace annulet::app
