// MeshFaults collected over the whole model, and numbers worded for people.
#pragma once

#include <fmt/format.h>

#include <annulet/core/diagnostics.hpp>
#include <annulet/core/vec3.hpp>
#include <string>
#include <vector>

namespace annulet {

class MeshFaults {
public:
    void add(const Position& where, std::string message, std::string help = {}) {
        list_.push_back({Severity::error, where, std::move(message), std::move(help)});
    }
    bool empty() const { return list_.empty(); }
    /// Throws InputError if there is any, in order of position.
    void throw_if_any();

private:
    std::vector<Diagnostic> list_;
};

/// Millimetres to four figures, rounding noise shown as zero.
std::string mm(double metres);
std::string mm(const Vec2& point);

}  // namespace annulet
