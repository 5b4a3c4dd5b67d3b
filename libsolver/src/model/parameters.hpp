// Parameters of a model file: evaluated on demand, in any order.
#pragma once

#include "model/expression.hpp"
#include "model/parsed_text.hpp"

#include <map>
#include <optional>
#include <string>

namespace annulet {

class Parameters {
public:
    /// `overrides`: name to text. Faults of names and overrides are reported at once.
    Parameters(const ParsedText& parsed, const std::map<std::string, std::string>& overrides, double unit_m,
               Faults& faults);
    Parameters(const Parameters&) = delete;
    Parameters& operator=(const Parameters&) = delete;

    /// Value of a number or a string node; nothing when faulty (reported).
    std::optional<Quantity> evaluate(const toml::node& node, const std::string& what);
    /// Evaluates every parameter, used or not; SI values, bare numbers as written.
    std::map<std::string, double> evaluate_all();
    bool contains(const std::string& name) const { return entries_.count(name) > 0; }
    const std::vector<std::string>& names() const { return scope_.names; }
    double unit_m() const { return scope_.unit_m; }

private:
    enum class State { fresh, running, done, failed };
    struct Entry {
        const toml::node* node = nullptr;
        const std::string* override_text = nullptr;
        State state = State::fresh;
        Quantity value{};
    };

    void read_names(const toml::table& table);
    void read_overrides(const std::map<std::string, std::string>& overrides);
    Quantity lookup(const std::string& name, std::size_t offset);
    std::optional<Quantity> resolve(const std::string& name, Entry& entry);
    std::optional<Quantity> overridden(const std::string& name, Entry& entry);
    std::string cycle_through(const std::string& name) const;

    const ParsedText& parsed_;
    Faults& faults_;
    std::map<std::string, Entry> entries_;
    std::vector<std::string> running_;
    ExpressionScope scope_;
};

}  // namespace annulet
