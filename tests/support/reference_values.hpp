// The check values of tests/reference/values.json, by kind or by identifier.
#pragma once

#include <complex>
#include <nlohmann/json.hpp>
#include <string>
#include <vector>

namespace annulet::test {

/// One entry: `kind`, `name`, `geometry`, `quantity`, `value`, `unit`, `tolerance`, `source`, `how`, `note`, `id`.
struct ReferenceEntry {
    nlohmann::json json;

    std::string id() const { return json.at("id"); }
    std::string source() const { return json.at("source"); }
    /// A number of `geometry`.
    double geometry(const std::string& key) const { return json.at("geometry").at(key); }
    bool has_geometry(const std::string& key) const { return json.at("geometry").contains(key); }
    /// The value if it is one number.
    double real() const { return json.at("value"); }
    /// A number among the named values.
    double real(const std::string& key) const { return json.at("value").at(key); }
    /// The value if it is one complex number.
    std::complex<double> complex() const { return complex_of(json.at("value")); }
    /// A complex number among the named values.
    std::complex<double> complex(const std::string& key) const { return complex_of(json.at("value").at(key)); }
    /// The size of the tolerance; its meaning ("rel", "abs", ...) is in `tolerance.type`.
    double tolerance() const { return json.at("tolerance").at("value"); }

private:
    static std::complex<double> complex_of(const nlohmann::json& pair);
};

/// All entries of a kind; throws `std::runtime_error` if there is none, so that no test passes for want of data.
std::vector<ReferenceEntry> reference_values(const std::string& kind);

/// The entry of an identifier such as "loop_impedance_00"; throws `std::runtime_error` if there is none.
ReferenceEntry reference_value(const std::string& id);

}  // namespace annulet::test
