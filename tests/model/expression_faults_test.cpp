// Faults within values.
#include "fault_case.hpp"

namespace annulet {
namespace {

class ExpressionFaults : public testing::TestWithParam<FaultCase> {};

TEST_P(ExpressionFaults, SaysExactly) {
    EXPECT_EQ(faults_of(GetParam().text), GetParam().expected);
}

// clang-format off
const FaultCase cases[] = {
{"UnknownParameter",
R"([parameters]
radius = 50
width = "radus/5"
)",
R"(m.toml:3:10: error: parameter 'width': unknown parameter 'radus'
    width = "radus/5"
             ^
help: did you mean 'radius'?
)"},
{"UnitWithoutNumber",
R"([parameters]
width = "mm"
)",
R"(m.toml:2:10: error: parameter 'width': unknown parameter 'mm'
    width = "mm"
             ^
help: a unit stands after a number, as in 1 mm
)"},
{"UndefinedParameter",
R"([parameters]
width = "breadth"
)",
R"(m.toml:2:10: error: parameter 'width': unknown parameter 'breadth'
    width = "breadth"
             ^
help: define it under [parameters]
)"},
{"UnknownUnit",
R"([parameters]
f0 = "868.3 Mhz"
)",
R"(m.toml:2:13: error: parameter 'f0': unknown unit 'Mhz'
    f0 = "868.3 Mhz"
                ^
help: did you mean 'MHz'?
)"},
{"ParameterAsUnit",
R"([parameters]
radius = 50
width = "2 radius"
)",
R"(m.toml:3:12: error: parameter 'width': 'radius' is a parameter, not a unit
    width = "2 radius"
               ^
help: write * between the number and 'radius'
)"},
{"MixedSum",
R"([parameters]
width = "8 mm"
x = "width + 3 MHz"
)",
R"(m.toml:3:12: error: parameter 'x': cannot add a frequency to a length
    x = "width + 3 MHz"
               ^
)"},
{"MixedDifference",
R"([parameters]
x = "1 nH - 2 pF"
)",
R"(m.toml:2:11: error: parameter 'x': cannot subtract a capacitance from an inductance
    x = "1 nH - 2 pF"
              ^
)"},
{"MixedComparison",
R"~([parameters]
x = "max(8 mm, 15 deg)"
)~",
R"~(m.toml:2:6: error: parameter 'x': cannot compare a length with an angle
    x = "max(8 mm, 15 deg)"
         ^
)~"},
{"PercentAdded",
R"([parameters]
x = "8 mm + 10 %"
)",
R"(m.toml:2:11: error: parameter 'x': cannot add a ratio to a length
    x = "8 mm + 10 %"
              ^
help: write a product, as in width * (1 + 10 %)
)"},
{"DivisionByZero",
R"~([parameters]
x = "8 mm/(3 - 3)"
)~",
R"~(m.toml:2:10: error: parameter 'x': division by zero
    x = "8 mm/(3 - 3)"
             ^
)~"},
{"RootOfNegative",
R"~([parameters]
x = "sqrt(4 - 5)"
)~",
R"~(m.toml:2:6: error: parameter 'x': square root of the negative value -1
    x = "sqrt(4 - 5)"
         ^
)~"},
{"RootOfLength",
R"~([parameters]
x = "sqrt(4 mm)"
)~",
R"~(m.toml:2:6: error: parameter 'x': the square root of a length is of no physical kind
    x = "sqrt(4 mm)"
         ^
)~"},
{"SineOfNumber",
R"~([parameters]
x = "sin(30)"
)~",
R"~(m.toml:2:6: error: parameter 'x': sin takes an angle, but was given a number
    x = "sin(30)"
         ^
help: write the unit, as in sin(30 deg) or sin(x * 1 rad)
)~"},
{"ArcSineOutOfRange",
R"~([parameters]
x = "asin(1.5)"
)~",
R"~(m.toml:2:6: error: parameter 'x': asin takes a number from -1 to 1, not 1.5
    x = "asin(1.5)"
         ^
)~"},
{"ArcTangentOfLength",
R"~([parameters]
x = "atan(1 mm)"
)~",
R"~(m.toml:2:6: error: parameter 'x': atan takes a plain number, but was given a length
    x = "atan(1 mm)"
         ^
)~"},
{"UnknownFunction",
R"~([parameters]
x = "squrt(4)"
)~",
R"~(m.toml:2:6: error: parameter 'x': unknown function 'squrt'
    x = "squrt(4)"
         ^
help: did you mean 'sqrt'?
)~"},
{"FunctionWithoutArguments",
R"([parameters]
x = "2*sqrt"
)",
R"(m.toml:2:8: error: parameter 'x': 'sqrt' is a function
    x = "2*sqrt"
           ^
help: write sqrt(...)
)"},
{"TooFewArguments",
R"~([parameters]
x = "atan2(1)"
)~",
R"~(m.toml:2:6: error: parameter 'x': atan2 takes 2 arguments, but was given 1
    x = "atan2(1)"
         ^
)~"},
{"TooManyArguments",
R"~([parameters]
x = "sqrt(1, 2)"
)~",
R"~(m.toml:2:6: error: parameter 'x': sqrt takes 1 argument, but was given 2
    x = "sqrt(1, 2)"
         ^
)~"},
{"MissingOperator",
R"([parameters]
r = 2
x = "(1 + 2) r"
)",
R"(m.toml:3:14: error: parameter 'x': an operator is missing here
    x = "(1 + 2) r"
                 ^
help: write * for a product, as in 2*radius
)"},
{"MissingOperand",
R"([parameters]
x = "2 * "
)",
R"(m.toml:2:10: error: parameter 'x': the expression ends too early
    x = "2 * "
             ^
help: a value is missing at its end
)"},
{"MissingParenthesis",
R"([parameters]
x = "2 * (3 + 4"
)",
R"(m.toml:2:10: error: parameter 'x': this '(' has no ')'
    x = "2 * (3 + 4"
             ^
)"},
{"SurplusParenthesis",
R"~([parameters]
x = "2 * 3)"
)~",
R"~(m.toml:2:11: error: parameter 'x': there is a ')' without its '('
    x = "2 * 3)"
              ^
)~"},
{"StrangeCharacter",
R"([parameters]
x = "2 & 3"
)",
R"(m.toml:2:8: error: parameter 'x': '&' has no meaning in an expression
    x = "2 & 3"
           ^
help: use + - * / ^ ( ), numbers with units, parameters and functions
)"},
{"EmptyText",
R"([parameters]
x = ""
)",
R"(m.toml:2:6: error: parameter 'x': the value is an empty text
    x = ""
         ^
help: write a number, perhaps with a unit, such as "8 mm"
)"},
{"PowerAfterUnit",
R"([parameters]
x = "2 mm^2"
)",
R"(m.toml:2:10: error: parameter 'x': a power directly after a unit can be read in two ways
    x = "2 mm^2"
             ^
help: write (2 mm)^2, or 2 * (1 mm)^2
)"},
{"FractionalPower",
R"([parameters]
x = "(2 mm)^1.5"
)",
R"(m.toml:2:12: error: parameter 'x': a length takes a whole exponent from -12 to 12, not 1.5
    x = "(2 mm)^1.5"
               ^
)"},
{"PowerOfNegative",
R"([parameters]
x = "(-2)^0.5"
)",
R"(m.toml:2:10: error: parameter 'x': a negative number has no power with a fractional exponent
    x = "(-2)^0.5"
             ^
)"},
{"ExponentWithUnit",
R"~([parameters]
x = "2^(1 mm)"
)~",
R"~(m.toml:2:7: error: parameter 'x': an exponent must be a plain number, but is a length
    x = "2^(1 mm)"
          ^
)~"},
{"TooLargeNumber",
R"([parameters]
x = "1e999"
)",
R"(m.toml:2:6: error: parameter 'x': the number is too large or too small
    x = "1e999"
         ^
)"},
{"Overflow",
R"([parameters]
x = "1e200*1e200"
)",
R"(m.toml:2:11: error: parameter 'x': the result is not a finite number
    x = "1e200*1e200"
              ^
)"},
{"NoKind",
R"~([parameters]
x = "(1 mm)^12*(1 mm)^12*(1 mm)"
)~",
R"~(m.toml:2:25: error: parameter 'x': the result is of no physical kind
    x = "(1 mm)^12*(1 mm)^12*(1 mm)"
                            ^
)~"},
{"NotANumber",
R"([parameters]
x = nan
)",
R"(m.toml:2:5: error: parameter 'x' is not a finite number
    x = nan
        ^
)"},
{"Infinite",
R"([parameters]
x = -inf
)",
R"(m.toml:2:5: error: parameter 'x' is not a finite number
    x = -inf
        ^
)"},
};
// clang-format on

INSTANTIATE_TEST_SUITE_P(Each, ExpressionFaults, testing::ValuesIn(cases), case_name);

}  // namespace
}  // namespace annulet
