#include "model/functions.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <array>
#include <cmath>

namespace annulet {

namespace {

struct Function {
    std::string_view name;
    std::size_t fewest;
    std::size_t most;
};

constexpr std::size_t any_number = 100;
constexpr auto functions = std::to_array<Function>({{"sqrt", 1, 1},
                                                    {"sin", 1, 1},
                                                    {"cos", 1, 1},
                                                    {"tan", 1, 1},
                                                    {"asin", 1, 1},
                                                    {"acos", 1, 1},
                                                    {"atan", 1, 1},
                                                    {"atan2", 2, 2},
                                                    {"hypot", 2, 2},
                                                    {"abs", 1, 1},
                                                    {"min", 1, any_number},
                                                    {"max", 1, any_number}});

const Function* find_function(std::string_view name) {
    const auto found =
        std::find_if(functions.begin(), functions.end(), [&](const Function& f) { return f.name == name; });
    return found == functions.end() ? nullptr : &*found;
}

[[noreturn]] void fail(std::size_t offset, std::string message, std::string help = {}) {
    throw ExpressionFault{offset, std::move(message), std::move(help)};
}

Quantity pure(double value) {
    return {value, {}, true};
}
Quantity angle(double radians) {
    return {radians, kinds::angle.dimension, false};
}

Quantity root(const Quantity& x, std::size_t offset) {
    if (x.value < 0) fail(offset, fmt::format("square root of the negative value {}", to_text(x.value, x.dimension)));
    const Dimension d = x.dimension;
    if (d.metre % 2 || d.kilogram % 2 || d.second % 2 || d.ampere % 2 || d.radian % 2) {
        fail(offset, fmt::format("the square root of {} is of no physical kind", kind_with_article(d)));
    }
    return {std::sqrt(x.value), {d.metre / 2, d.kilogram / 2, d.second / 2, d.ampere / 2, d.radian / 2}, x.ratio};
}

// Degrees or radians? A bare number would be read either way, so it must say.
Quantity of_angle(const std::string& name, const Quantity& x, std::size_t offset) {
    if (x.dimension != kinds::angle.dimension) {
        fail(offset, fmt::format("{} takes an angle, but was given {}", name, kind_with_article(x)),
             fmt::format("write the unit, as in {0}(30 deg) or {0}(x * 1 rad)", name));
    }
    if (name == "sin") return pure(std::sin(x.value));
    if (name == "cos") return pure(std::cos(x.value));
    return pure(std::tan(x.value));
}

Quantity to_angle(const std::string& name, const Quantity& x, std::size_t offset) {
    if (!x.dimension.none()) {
        fail(offset, fmt::format("{} takes a plain number, but was given {}", name, kind_with_article(x)));
    }
    if (name == "atan") return angle(std::atan(x.value));
    if (std::abs(x.value) > 1) fail(offset, fmt::format("{} takes a number from -1 to 1, not {:.6g}", name, x.value));
    return angle(name == "asin" ? std::asin(x.value) : std::acos(x.value));
}

Quantity extreme(const std::string& name, const std::vector<Quantity>& arguments, double unit_m, std::size_t offset) {
    Quantity best = arguments.front();
    for (Quantity next : arguments) {
        make_alike(best, next, unit_m, offset, "compare");
        const bool ratio = best.ratio || next.ratio;
        if (name == "min" ? next.value < best.value : next.value > best.value) best = next;
        best.ratio = ratio;
    }
    return best;
}

}  // namespace

bool is_function(const std::string& name) {
    return find_function(name) != nullptr;
}

std::vector<std::string> function_names() {
    std::vector<std::string> names;
    for (const Function& function : functions) names.emplace_back(function.name);
    return names;
}

void make_alike(Quantity& left, Quantity& right, double unit_m, std::size_t offset, const char* verb) {
    if (left.dimension == right.dimension) return;
    if (left.is_bare()) {
        left = {left.value * bare_scale(right.dimension, unit_m), right.dimension, false};
    } else if (right.is_bare()) {
        right = {right.value * bare_scale(left.dimension, unit_m), left.dimension, false};
    } else {
        const std::string a = kind_with_article(left), b = kind_with_article(right);
        const std::string message = std::string(verb) == "add"        ? fmt::format("cannot add {} to {}", b, a)
                                    : std::string(verb) == "subtract" ? fmt::format("cannot subtract {} from {}", b, a)
                                                                      : fmt::format("cannot compare {} with {}", a, b);
        fail(offset, message, right.ratio ? "write a product, as in width * (1 + 10 %)" : "");
    }
}

Quantity raise(const Quantity& base, const Quantity& exponent, std::size_t offset) {
    if (!exponent.dimension.none()) {
        fail(offset, fmt::format("an exponent must be a plain number, but is {}", kind_with_article(exponent)));
    }
    if (base.value == 0 && exponent.value < 0) fail(offset, "division by zero");
    const double value = std::pow(base.value, exponent.value);
    if (std::isnan(value)) fail(offset, "a negative number has no power with a fractional exponent");
    if (base.dimension.none()) return {value, {}, base.ratio};
    const bool whole = std::abs(exponent.value) <= 12 && exponent.value == std::round(exponent.value);
    if (!whole) {
        fail(offset, fmt::format("{} takes a whole exponent from -12 to 12, not {:.6g}",
                                 kind_with_article(base.dimension), exponent.value));
    }
    const Dimension dimension = power(base.dimension, static_cast<int>(exponent.value));
    return {value, dimension, dimension.none()};
}

Quantity apply_function(const std::string& name, const std::vector<Quantity>& arguments, double unit_m,
                        std::size_t offset) {
    const Function& function = *find_function(name);
    if (arguments.size() < function.fewest || arguments.size() > function.most) {
        const std::string wanted = function.fewest == function.most
                                       ? fmt::format("{}", function.fewest)
                                       : fmt::format("{} to {}", function.fewest, function.most);
        fail(offset, fmt::format("{} takes {} argument{}, but was given {}", name, wanted, function.most > 1 ? "s" : "",
                                 arguments.size()));
    }
    if (name == "sqrt") return root(arguments[0], offset);
    if (name == "sin" || name == "cos" || name == "tan") return of_angle(name, arguments[0], offset);
    if (name == "asin" || name == "acos" || name == "atan") return to_angle(name, arguments[0], offset);
    if (name == "abs") return {std::abs(arguments[0].value), arguments[0].dimension, arguments[0].ratio};
    if (name == "min" || name == "max") return extreme(name, arguments, unit_m, offset);
    Quantity a = arguments[0], b = arguments[1];
    make_alike(a, b, unit_m, offset, "compare");
    if (name == "atan2") return angle(std::atan2(a.value, b.value));
    return {std::hypot(a.value, b.value), a.dimension, a.ratio || b.ratio};
}

}  // namespace annulet
