#include "command.hpp"
#include "common_options.hpp"
#include "suggest.hpp"
#include "terminal.hpp"

#include <annulet/core/diagnostics.hpp>

#include <exception>
#include <new>

namespace annulet::app {
namespace {

int parse_and_run(int argc, char** argv) {
    CLI::App parser{"Antennas of flat strip and wire: impedance, match and radiation from a model file", "annulet"};
    parser.set_version_flag("--version", program_version());
    parser.require_subcommand(1);
    std::function<int()> chosen;
    for (const auto& command : all_commands()) {
        auto* sub = parser.add_subcommand(command.name, command.question);
        auto action = command.prepare(*sub);
        sub->parse_complete_callback([&chosen, action] { chosen = action; });
    }
    try {
        parser.parse(argc, argv);
    } catch (const CLI::Success& asked) {
        return parser.exit(asked);
    } catch (const CLI::ParseError& error) {
        const auto fault = explain(parser, {argv + 1, argv + argc}, error);
        report_error(fault.message, fault.help);
        return bad_input;
    }
    return chosen();
}

int guarded(int argc, char** argv) {
    try {
        return parse_and_run(argc, argv);
    } catch (const Reported&) {
        return bad_input;
    } catch (const InputError& error) {
        for (const auto& fault : error.faults()) report_error(fault.message, fault.help);
        return bad_input;
    } catch (const NumericalError& error) {
        report_error(error.what());
        return numerics_failed;
    } catch (const FileError& error) {
        report_error(error.what());
        return file_failed;
    } catch (const Cancelled&) {
        report_error("interrupted; nothing was written");
        return interrupted;
    } catch (const std::bad_alloc&) {
        report_error("there is not enough memory for this model", "a coarser mesh or a lower top frequency takes less");
        return numerics_failed;
    }
}

}  // namespace
}  // namespace annulet::app

int main(int argc, char** argv) {
    annulet::app::catch_interrupts();
    try {
        return annulet::app::guarded(argc, argv);
    } catch (const std::exception& error) {
        annulet::app::report_error(error.what());
        return annulet::app::numerics_failed;
    }
}
