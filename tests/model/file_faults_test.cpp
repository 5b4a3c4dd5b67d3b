// Faults of the file as a whole and of the names of parameters.
#include "fault_case.hpp"

namespace annulet {
namespace {

class FileFaults : public testing::TestWithParam<FaultCase> {};

TEST_P(FileFaults, SaysExactly) {
    EXPECT_EQ(faults_of(GetParam().text), GetParam().expected);
}

// clang-format off
const FaultCase cases[] = {
{"SyntaxError",
R"(title = "gauge
)",
R"(m.toml:1:15: error: not valid TOML: Error while parsing string: unescaped control characters other than TAB (U+0009) are explicitly prohibited
    title = "gauge
                  ^
help: a text ends with its quote on the same line
)"},
{"StrangeTableName",
R"([.]
)",
R"(m.toml:1:2: error: not valid TOML: Error while parsing key: expected bare key starting character or string delimiter, saw '.'
    [.]
     ^
)"},
{"DuplicateKey",
R"(unit = "mm"
unit = "m"
)",
R"(m.toml:2:8: error: not valid TOML: Error while parsing key-value pair: cannot redefine existing string 'unit'
    unit = "m"
           ^
)"},
{"UnknownTopKey",
R"(titel = "gauge"
)",
R"(m.toml:1:1: error: unknown key 'titel' in the model
    titel = "gauge"
    ^
help: did you mean 'title'?
)"},
{"UnknownKeyFarFromAny",
R"([goal]
colour = 3
)",
R"(m.toml:2:1: error: unknown key 'colour' in [goal]
    colour = 3
    ^
help: known keys are band, vswr, reject
)"},
{"ReservedTable",
R"([[coating]]
thickness = "20 um"
)",
R"(m.toml:1:3: error: 'coating' is reserved for a later version
    [[coating]]
      ^
help: remove it: the model is solved without
)"},
{"TitleIsNumber",
R"(title = 5
)",
R"(m.toml:1:9: error: 'title' of the model must be a text, but is a number
    title = 5
            ^
help: write it in quotes
)"},
{"UnitIsNoLength",
R"(unit = "MHz"
)",
R"(m.toml:1:8: error: 'unit' must be a unit of length
    unit = "MHz"
           ^
help: write "um", "mm", "cm", "m", "mil" or "inch"
)"},
{"SingleBrackets",
R"([metal]
name = "band"
)",
R"(m.toml:1:1: error: 'metal' must be a list of tables
    [metal]
    ^
help: write [[metal]] with double brackets
)"},
{"DoubleBrackets",
R"([[goal]]
vswr = 2
)",
R"(m.toml:1:1: error: 'goal' must be a table
    [[goal]]
    ^
help: write [goal] once, with single brackets
)"},
{"ListOfNumbers",
R"(metal = [1]
)",
R"(m.toml:1:10: error: each entry of 'metal' must be a table
    metal = [1]
             ^
help: write [[metal]] with double brackets
)"},
{"ParametersNotTable",
R"(parameters = 3
)",
R"(m.toml:1:14: error: 'parameters' must be a table
    parameters = 3
                 ^
help: write [parameters] and below it name = value
)"},
{"ParameterName",
R"([parameters]
"my-width" = 3
)",
R"(m.toml:2:1: error: 'my-width' cannot be the name of a parameter
    "my-width" = 3
    ^
help: use letters, digits and _, beginning with a letter
)"},
{"ParameterReserved",
R"([parameters]
c = 3
)",
R"(m.toml:2:1: error: a parameter cannot be called 'c', which is a function or constant
    c = 3
    ^
help: choose another name
)"},
{"ParameterList",
R"([parameters]
width = [1, 2]
)",
R"(m.toml:2:9: error: parameter 'width' must be a number or a text with a unit or expression
    width = [1, 2]
            ^
)"},
{"ParameterCycle",
R"([parameters]
a = "2*b"
b = "a + 1"
)",
R"(m.toml:3:6: error: parameter 'b': parameter 'a' depends on itself: a -> b -> a
    b = "a + 1"
         ^
)"},
};
// clang-format on

INSTANTIATE_TEST_SUITE_P(Each, FileFaults, testing::ValuesIn(cases), case_name);

}  // namespace
}  // namespace annulet
