#include "support/reference_values.hpp"

#include <fstream>
#include <stdexcept>

namespace annulet::test {

namespace {

nlohmann::json load() {
    const std::string path = std::string(ANNULET_SOURCE_DIR) + "/tests/reference/values.json";
    std::ifstream file(path);
    if (!file) throw std::runtime_error("cannot read " + path);
    return nlohmann::json::parse(file).at("values");
}

std::vector<ReferenceEntry> matching(const std::string& key, const std::string& value) {
    std::vector<ReferenceEntry> result;
    for (const auto& entry : load())
        if (entry.at(key) == value) result.push_back({entry});
    if (result.empty()) throw std::runtime_error("no reference value with " + key + " " + value);
    return result;
}

}  // namespace

std::complex<double> ReferenceEntry::complex_of(const nlohmann::json& pair) {
    return {pair.at("re"), pair.at("im")};
}

std::vector<ReferenceEntry> reference_values(const std::string& kind) {
    return matching("kind", kind);
}

ReferenceEntry reference_value(const std::string& id) {
    return matching("id", id).front();
}

}  // namespace annulet::test
