#include "suggest.hpp"

#include <annulet/core/diagnostics.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <optional>

namespace annulet::app {
namespace {

using Words = std::vector<std::string>;

Words option_names(const CLI::App& parser) {
    Words names;
    for (const auto* option : parser.get_options()) {
        for (const auto& name : option->get_lnames()) names.push_back("--" + name);
        for (const auto& name : option->get_snames()) names.push_back("-" + name);
    }
    return names;
}

bool is_option(const std::string& word) {
    return word.size() > 1 && word[0] == '-' && std::isdigit(static_cast<unsigned char>(word[1])) == 0;
}

std::string suggestion(const std::string& word, const Words& known, const std::string& help_call) {
    const auto near = nearest(word, known);
    return near.empty() ? fmt::format("see {}", help_call) : fmt::format("did you mean '{}'?", near);
}

std::optional<UsageFault> unknown_option(const CLI::App& parser, const Words& arguments, const std::string& help_call) {
    const auto known = option_names(parser);
    for (const auto& word : arguments) {
        if (word == "--") return std::nullopt;
        const auto name = word.substr(0, word.find('='));
        if (!is_option(name) || std::find(known.begin(), known.end(), name) != known.end()) continue;
        return UsageFault{fmt::format("unknown option '{}'", name), suggestion(name, known, help_call)};
    }
    return std::nullopt;
}

}  // namespace

UsageFault explain(const CLI::App& parser, const Words& arguments, const CLI::ParseError& error) {
    const auto first = std::find_if_not(arguments.begin(), arguments.end(), is_option);
    Words commands;
    for (const auto* command : parser.get_subcommands([](const CLI::App*) { return true; }))
        commands.push_back(command->get_name());
    if (const auto fault = unknown_option(parser, {arguments.begin(), first}, "annulet --help")) return *fault;
    if (first == arguments.end()) return {"no command given", "see annulet --help"};
    if (std::find(commands.begin(), commands.end(), *first) == commands.end())
        return {fmt::format("unknown command '{}'", *first), suggestion(*first, commands, "annulet --help")};
    const auto help_call = fmt::format("annulet {} --help", *first);
    const Words rest(first + 1, arguments.end());
    if (const auto fault = unknown_option(*parser.get_subcommand(*first), rest, help_call)) return *fault;
    return {error.what(), fmt::format("see {}", help_call)};
}

}  // namespace annulet::app
