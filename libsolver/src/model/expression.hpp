// Arithmetic with units: "2*radius + 0.5 mm". An own parser rather than a library because every step carries a
// dimension and every fault its column, neither of which a parser of plain numbers can report.
#pragma once

#include <annulet/core/units.hpp>

#include <cstddef>
#include <functional>
#include <string>
#include <string_view>
#include <vector>

namespace annulet {

/// Thrown by the parser; `offset` counts bytes from the start of the text.
struct ExpressionFault {
    std::size_t offset;
    std::string message;
    std::string help;
};

/// Thrown by a lookup whose parameter is faulty itself and has been reported.
struct AlreadyReported {};

struct ExpressionScope {
    /// Value of a parameter; throws ExpressionFault (unknown, cycle) or AlreadyReported.
    std::function<Quantity(const std::string& name, std::size_t offset)> lookup;
    std::vector<std::string> names;  ///< of all parameters, for suggestions
    double unit_m = 1e-3;            ///< what a bare number means beside a length
    int depth = 0;                   ///< nesting, kept through parameters that refer to each other
};

inline constexpr std::size_t longest_expression = 2000;
inline constexpr int deepest_expression = 200;

/// Functions and constants, which no parameter may be called.
bool is_reserved_name(const std::string& name);
bool is_identifier(const std::string& text);

/// SI value of one bare number where `dimension` is meant: the length unit, degrees, else SI.
double bare_scale(const Dimension& dimension, double unit_m);

Quantity evaluate_expression(std::string_view text, ExpressionScope& scope);

}  // namespace annulet
