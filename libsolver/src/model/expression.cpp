#include "model/expression.hpp"

#include <annulet/core/constants.hpp>
#include "model/functions.hpp"

#include <fmt/format.h>

#include <charconv>
#include <cmath>
#include <string>

namespace annulet {

namespace {

constexpr int largest_exponent = 24;

bool is_letter(char c) {
    return (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z') || c == '_';
}
bool is_digit(char c) {
    return c >= '0' && c <= '9';
}
bool is_beyond_ascii(char c) {
    return static_cast<unsigned char>(c) >= 0x80;
}

class Parser {
public:
    Parser(std::string_view text, ExpressionScope& scope) : text_(text), scope_(scope) {}

    Quantity whole() {
        if (text_.size() > longest_expression) {
            fail(0, fmt::format("the expression has {} characters, more than {}", text_.size(), longest_expression),
                 "split it into parameters");
        }
        skip_blanks();
        if (at_end()) fail(0, "the value is an empty text", "write a number, perhaps with a unit, such as \"8 mm\"");
        const Quantity value = sum();
        if (!at_end()) unexpected();
        return value;
    }

private:
    // Counts nesting for as long as it lives.
    class Level {
    public:
        Level(Parser& parser) : parser_(parser) {
            if (++parser_.scope_.depth > deepest_expression) {
                --parser_.scope_.depth;
                parser_.fail(parser_.at_, fmt::format("the expression nests more than {} deep", deepest_expression),
                             "split it into parameters, or shorten the chain of parameters");
            }
        }
        ~Level() { --parser_.scope_.depth; }
        Level(const Level&) = delete;
        Level& operator=(const Level&) = delete;

    private:
        Parser& parser_;
    };

    [[noreturn]] void fail(std::size_t offset, std::string message, std::string help = {}) const {
        throw ExpressionFault{offset, std::move(message), std::move(help)};
    }

    bool at_end() const { return at_ >= text_.size(); }
    char peek() const { return at_end() ? '\0' : text_[at_]; }
    void skip_blanks() {
        while (!at_end() && (peek() == ' ' || peek() == '\t')) ++at_;
    }
    bool take(char c) {
        if (peek() != c || at_end()) return false;
        ++at_;
        skip_blanks();
        return true;
    }

    [[noreturn]] void unexpected() const {
        if (at_end()) fail(at_, "the expression ends too early", "a value is missing at its end");
        const char c = peek();
        if (c == ')') fail(at_, "there is a ')' without its '('");
        if (is_letter(c) || is_digit(c)) {
            fail(at_, "an operator is missing here", "write * for a product, as in 2*radius");
        }
        std::size_t size = 1;
        while (at_ + size < text_.size() && (static_cast<unsigned char>(text_[at_ + size]) & 0xC0U) == 0x80U) ++size;
        fail(at_, fmt::format("'{}' has no meaning in an expression", text_.substr(at_, size)),
             "use + - * / ^ ( ), numbers with units, parameters and functions");
    }

    Quantity checked(Quantity value, std::size_t offset) const {
        if (!std::isfinite(value.value)) fail(offset, "the result is not a finite number");
        if (value.dimension.largest() > largest_exponent) fail(offset, "the result is of no physical kind");
        return value;
    }

    Quantity sum() {
        Quantity left = product();
        while (peek() == '+' || peek() == '-') {
            const std::size_t offset = at_;
            const double sign = peek() == '+' ? 1 : -1;
            take(peek());
            Quantity right = product();
            make_alike(left, right, scope_.unit_m, offset, sign > 0 ? "add" : "subtract");
            left = checked({left.value + sign * right.value, left.dimension, left.ratio || right.ratio}, offset);
        }
        return left;
    }

    Quantity product() {
        Quantity left = signed_factor();
        while (peek() == '*' || peek() == '/') {
            const std::size_t offset = at_;
            const bool divide = peek() == '/';
            take(peek());
            const Quantity right = signed_factor();
            if (divide && right.value == 0) fail(offset, "division by zero");
            const Dimension dimension = divide ? left.dimension / right.dimension : left.dimension * right.dimension;
            // A bare number keeps its freedom to be a length when it is multiplied by a pure ratio.
            const bool ratio = dimension.none() && !(left.is_bare() || right.is_bare());
            left = checked({divide ? left.value / right.value : left.value * right.value, dimension, ratio}, offset);
        }
        return left;
    }

    Quantity signed_factor() {
        const Level level(*this);
        if (take('-')) {
            Quantity value = signed_factor();
            value.value = -value.value;
            return value;
        }
        if (take('+')) return signed_factor();
        return raised();
    }

    Quantity raised() {
        literal_with_unit_ = false;
        const Quantity base = primary();
        const bool ambiguous = literal_with_unit_;
        const std::size_t offset = at_;
        if (!take('^')) return base;
        if (ambiguous) {
            fail(offset, "a power directly after a unit can be read in two ways", "write (2 mm)^2, or 2 * (1 mm)^2");
        }
        const Quantity exponent = signed_factor();
        return checked(raise(base, exponent, offset), offset);
    }

    Quantity primary() {
        const std::size_t offset = at_;
        if (take('(')) {
            const Quantity value = sum();
            if (!take(')')) missing_parenthesis(offset);
            literal_with_unit_ = false;
            return value;
        }
        if (is_digit(peek()) || peek() == '.') return literal();
        if (is_letter(peek())) return named();
        unexpected();
    }

    [[noreturn]] void missing_parenthesis(std::size_t offset) const {
        if (at_end()) fail(offset, "this '(' has no ')'");
        unexpected();
    }

    Quantity literal() {
        const std::size_t offset = at_;
        double value = 0;
        const auto [end, error] = std::from_chars(text_.data() + at_, text_.data() + text_.size(), value);
        if (error == std::errc::result_out_of_range) fail(offset, "the number is too large or too small");
        if (error != std::errc{}) unexpected();
        at_ = static_cast<std::size_t>(end - text_.data());
        skip_blanks();
        if (!is_letter(peek()) && !is_beyond_ascii(peek()) && peek() != '%') return {value, {}, false};
        literal_with_unit_ = true;
        return checked(unit().times(value), offset);
    }

    Unit unit() {
        const std::size_t offset = at_;
        if (peek() == '%') {
            ++at_;
        } else {
            while (!at_end() && (is_letter(peek()) || is_digit(peek()) || is_beyond_ascii(peek()))) ++at_;
        }
        const std::string symbol(text_.substr(offset, at_ - offset));
        if ((symbol == "S" || symbol == "MS") && text_.substr(at_, 2) == "/m" && !continues_at(at_ + 2)) {
            at_ += 2;
            skip_blanks();
            return *find_unit(symbol + "/m");
        }
        const auto found = find_unit(symbol);
        if (!found) unknown_unit(symbol, offset);
        skip_blanks();
        return *found;
    }

    bool continues_at(std::size_t offset) const {
        return offset < text_.size() && (is_letter(text_[offset]) || is_digit(text_[offset]));
    }

    [[noreturn]] void unknown_unit(const std::string& symbol, std::size_t offset) const {
        for (const std::string& name : scope_.names) {
            if (name == symbol) {
                fail(offset, fmt::format("'{}' is a parameter, not a unit", symbol),
                     fmt::format("write * between the number and '{}'", symbol));
            }
        }
        const std::string near = nearest(symbol, unit_symbols());
        fail(offset, fmt::format("unknown unit '{}'", symbol),
             near.empty() ? "" : fmt::format("did you mean '{}'?", near));
    }

    Quantity named() {
        const std::size_t offset = at_;
        while (!at_end() && (is_letter(peek()) || is_digit(peek()))) ++at_;
        const std::string name(text_.substr(offset, at_ - offset));
        skip_blanks();
        if (peek() == '(') return call(name, offset);
        if (name == "pi") return {constants::pi, {}, false};
        if (name == "c") return {constants::c0_m_per_s, {1, 0, -1, 0, 0}, false};
        if (is_function(name))
            fail(offset, fmt::format("'{0}' is a function", name), fmt::format("write {}(...)", name));
        const Level level(*this);
        return scope_.lookup(name, offset);
    }

    Quantity call(const std::string& name, std::size_t offset) {
        if (!is_function(name)) {
            const std::string near = nearest(name, function_names());
            fail(offset, fmt::format("unknown function '{}'", name),
                 near.empty() ? "there are sqrt sin cos tan asin acos atan atan2 hypot abs min max"
                              : fmt::format("did you mean '{}'?", near));
        }
        const std::size_t opening = at_;
        take('(');
        std::vector<Quantity> arguments;
        if (peek() != ')') {
            do {
                arguments.push_back(sum());
            } while (take(','));
        }
        if (!take(')')) missing_parenthesis(opening);
        literal_with_unit_ = false;
        return checked(apply_function(name, arguments, scope_.unit_m, offset), offset);
    }

    std::string_view text_;
    ExpressionScope& scope_;
    std::size_t at_ = 0;
    bool literal_with_unit_ = false;
};

}  // namespace

bool is_reserved_name(const std::string& name) {
    return name == "pi" || name == "c" || is_function(name);
}

bool is_identifier(const std::string& text) {
    if (text.empty() || !is_letter(text[0])) return false;
    for (const char c : text) {
        if (!is_letter(c) && !is_digit(c)) return false;
    }
    return true;
}

double bare_scale(const Dimension& d, double unit_m) {
    if (d == power(kinds::length.dimension, d.metre)) return std::pow(unit_m, d.metre);
    if (d == kinds::angle.dimension) return constants::pi / 180;
    return 1;
}

Quantity evaluate_expression(std::string_view text, ExpressionScope& scope) {
    return Parser(text, scope).whole();
}

}  // namespace annulet
