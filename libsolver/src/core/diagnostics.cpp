#include <annulet/core/diagnostics.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <cctype>
#include <string_view>

namespace annulet {

namespace {

constexpr std::size_t widest_line = 160;
constexpr std::size_t longest_word = 64;

bool continues_character(char c) {
    return (static_cast<unsigned char>(c) & 0xC0U) == 0x80U;
}

// Control characters of a damaged file must not reach the terminal.
std::string harmless(std::string_view text) {
    std::string clean(text);
    for (char& c : clean) {
        const auto code = static_cast<unsigned char>(c);
        if ((code < 0x20 && c != '\t') || code == 0x7F) c = '?';
    }
    return clean;
}

std::string_view line_of(std::string_view text, int line) {
    std::size_t begin = 0;
    for (int n = 1; n < line; ++n) {
        begin = text.find('\n', begin);
        if (begin == std::string_view::npos) return {};
        ++begin;
    }
    std::string_view found = text.substr(begin, text.find('\n', begin) - begin);
    if (!found.empty() && found.back() == '\r') found.remove_suffix(1);
    return found;
}

// Byte offset of a column counted in characters, no further than the end.
std::size_t offset_of(std::string_view line, int column) {
    std::size_t offset = 0;
    for (int n = 1; n < column && offset < line.size(); ++n) {
        ++offset;
        while (offset < line.size() && continues_character(line[offset])) ++offset;
    }
    return offset;
}

std::string line_with_caret(std::string_view line, int column) {
    std::size_t offset = offset_of(line, column);
    if (line.size() > widest_line) {
        std::size_t begin = offset > widest_line / 2 ? offset - widest_line / 2 : 0;
        while (begin > 0 && continues_character(line[begin])) --begin;
        std::size_t end = std::min(line.size(), begin + widest_line);
        while (end < line.size() && continues_character(line[end])) ++end;
        line = line.substr(begin, end - begin);
        offset -= begin;
    }
    std::string padding;
    for (const char c : line.substr(0, offset)) {
        if (!continues_character(c)) padding += c == '\t' ? '\t' : ' ';
    }
    return fmt::format("    {}\n    {}^\n", harmless(line), padding);
}

std::string summary(const std::vector<Diagnostic>& faults) {
    if (faults.empty()) return "bad input";
    if (faults.size() == 1) return faults.front().message;
    return fmt::format("{} (and {} more)", faults.front().message, faults.size() - 1);
}

std::vector<Diagnostic> in_order(std::vector<Diagnostic> faults) {
    std::stable_sort(faults.begin(), faults.end(),
                     [](const Diagnostic& a, const Diagnostic& b) { return a.where < b.where; });
    return faults;
}

// Wrong case is half a slip: "Mhz" is nearer to "MHz" than to "kHz".
std::size_t substitution_cost(char a, char b) {
    if (a == b) return 0;
    const auto lower = [](char c) { return std::tolower(static_cast<unsigned char>(c)); };
    return lower(a) == lower(b) ? 1 : 2;
}

// Optimal string alignment distance, two per slip: insertion, deletion, substitution, exchange of neighbours.
std::size_t distance(const std::string& a, const std::string& b) {
    std::vector<std::size_t> before(b.size() + 1), above(b.size() + 1), row(b.size() + 1);
    for (std::size_t j = 0; j <= b.size(); ++j) above[j] = 2 * j;
    for (std::size_t i = 1; i <= a.size(); ++i) {
        row[0] = 2 * i;
        for (std::size_t j = 1; j <= b.size(); ++j) {
            row[j] = std::min({above[j] + 2, row[j - 1] + 2, above[j - 1] + substitution_cost(a[i - 1], b[j - 1])});
            if (i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1])
                row[j] = std::min(row[j], before[j - 2] + 2);
        }
        std::swap(before, above);
        std::swap(above, row);
    }
    return above[b.size()];
}

}  // namespace

InputError::InputError(std::vector<Diagnostic> faults)
    : std::runtime_error(summary(in_order(faults))), faults_(in_order(std::move(faults))) {}

std::string format(const Diagnostic& fault, const std::string& file, const std::string& text) {
    std::string place = harmless(file);
    if (fault.where.line > 0) place += fmt::format(":{}", fault.where.line);
    if (fault.where.line > 0 && fault.where.column > 0) place += fmt::format(":{}", fault.where.column);
    std::string shown = fmt::format("{}: {}: {}\n", place, fault.severity == Severity::error ? "error" : "caution",
                                    harmless(fault.message));
    if (fault.where.line > 0 && fault.where.column > 0) {
        shown += line_with_caret(line_of(text, fault.where.line), fault.where.column);
    }
    if (!fault.help.empty()) shown += fmt::format("help: {}\n", harmless(fault.help));
    return shown;
}

std::string nearest(const std::string& word, const std::vector<std::string>& known) {
    if (word.empty() || word.size() > longest_word) return {};
    std::string best;
    std::size_t least = 2 * std::max<std::size_t>(1, word.size() / 3) + 1;
    for (const std::string& candidate : known) {
        if (candidate.size() > longest_word) continue;
        const std::size_t slips = distance(word, candidate);
        if (slips < least && slips < 2 * candidate.size()) {
            least = slips;
            best = candidate;
        }
    }
    return best;
}

}  // namespace annulet
