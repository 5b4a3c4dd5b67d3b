// Functions and operations of expressions on quantities. All throw ExpressionFault at `offset`.
#pragma once

#include "model/expression.hpp"

namespace annulet {

bool is_function(const std::string& name);
std::vector<std::string> function_names();

/// Gives a bare number beside a quantity that quantity's default unit; refuses different kinds.
/// `verb` ("add", "subtract", "compare") is for the message.
void make_alike(Quantity& left, Quantity& right, double unit_m, std::size_t offset, const char* verb);

/// base^exponent; quantities with a unit take whole exponents only.
Quantity raise(const Quantity& base, const Quantity& exponent, std::size_t offset);

Quantity apply_function(const std::string& name, const std::vector<Quantity>& arguments, double unit_m,
                        std::size_t offset);

}  // namespace annulet
