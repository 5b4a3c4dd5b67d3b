#include "model/parsed_text.hpp"

#include <algorithm>

namespace annulet {

namespace {

constexpr std::size_t most_faults = 100;

Position from_source(const toml::source_region& source) {
    return {static_cast<int>(source.begin.line), static_cast<int>(source.begin.column)};
}

bool starts_character(char c) {
    return (static_cast<unsigned char>(c) & 0xC0U) != 0x80U;
}

std::size_t skip_characters(std::string_view text, std::size_t at, int count) {
    for (; count > 0 && at < text.size(); --count) {
        ++at;
        while (at < text.size() && !starts_character(text[at])) ++at;
    }
    return at;
}

}  // namespace

Position position_of(const toml::node& node) {
    return from_source(node.source());
}
Position position_of(const toml::key& key) {
    return from_source(key.source());
}

Position ParsedText::within(const toml::node& node, std::string_view value, std::size_t offset) const {
    const Position start = position_of(node);
    if (start.line < 1 || static_cast<std::size_t>(start.line) > line_starts.size()) return start;
    const std::string_view all(text);
    const std::size_t quote =
        skip_characters(all, line_starts[static_cast<std::size_t>(start.line) - 1], start.column - 1);
    if (quote >= all.size() || (all[quote] != '"' && all[quote] != '\'')) return start;
    if (all.substr(quote + 1, value.size()) != value || value.find('\n') != std::string_view::npos) return start;
    const auto before = value.substr(0, std::min(offset, value.size()));
    const auto characters = std::count_if(before.begin(), before.end(), starts_character);
    return {start.line, start.column + 1 + static_cast<int>(characters)};
}

void Faults::add(Position where, std::string message, std::string help) {
    if (faults_.size() >= most_faults) {
        more_ = true;
        return;
    }
    Diagnostic fault{Severity::error, where, std::move(message), std::move(help)};
    const bool known = std::any_of(faults_.begin(), faults_.end(), [&](const Diagnostic& other) {
        return other.where == fault.where && other.message == fault.message;
    });
    if (!known) faults_.push_back(std::move(fault));
}

void Faults::throw_if_any() {
    if (faults_.empty()) return;
    if (more_) {
        const auto last = std::max_element(faults_.begin(), faults_.end(),
                                           [](const auto& a, const auto& b) { return a.where < b.where; });
        faults_.push_back({Severity::error, last->where, "there are more faults, which are not shown", ""});
    }
    throw InputError(faults_);
}

}  // namespace annulet
