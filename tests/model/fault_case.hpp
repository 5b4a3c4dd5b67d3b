// Faulty model texts and the whole of what the user reads about them.
#pragma once

#include <annulet/model/drawing.hpp>

#include <gtest/gtest.h>

#include <map>
#include <ostream>
#include <string>
#include <vector>

namespace annulet {

struct FaultCase {
    const char* name;
    const char* text;
    const char* expected;
    friend std::ostream& operator<<(std::ostream& out, const FaultCase& fault) { return out << fault.name; }
};

/// All faults of a text as shown to the user; empty when it is a good model.
inline std::string faults_of(const std::string& text, const std::map<std::string, std::string>& set = {},
                             const std::vector<std::string>& omit = {}) {
    std::string shown;
    try {
        evaluate(read_drawing(text, "m.toml"), set, omit);
    } catch (const InputError& error) {
        for (const Diagnostic& fault : error.faults()) shown += format(fault, "m.toml", text);
    }
    return shown;
}

inline std::string case_name(const testing::TestParamInfo<FaultCase>& info) {
    return info.param.name;
}

}  // namespace annulet
