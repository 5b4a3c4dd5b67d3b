#include "io/json_text.hpp"

#include <annulet/io/prove_result.hpp>

#include <fmt/format.h>

namespace annulet {
namespace {

using Json = nlohmann::ordered_json;

Json value_json(const ProveCase& c, std::complex<double> value) {
    if (!c.is_complex) return value.real();
    return {{"real", value.real()}, {"imag", value.imag()}};
}

std::string value_text(const ProveCase& c, std::complex<double> value) {
    return c.is_complex
               ? fmt::format("{:.5g} {} j{:.5g}", value.real(), value.imag() < 0 ? '-' : '+', std::abs(value.imag()))
               : fmt::format("{:.6g}", value.real());
}

const char* verdict(const ProveCase& c) {
    return !c.judged ? "shown" : c.pass() ? "pass" : "FAIL";
}

std::string line(const ProveCase& c) {
    return fmt::format("{:<5} {:<54} {:<25} {:>20} {:>20} {:>8.3f} %{}\n", verdict(c), c.name, c.quantity,
                       value_text(c, c.reference), value_text(c, c.computed), 100 * c.error(),
                       c.judged ? fmt::format(" of {:g} %", 100 * c.tolerance) : "");
}

}  // namespace

std::string prove_json(const ProveReport& report, const std::string& version) {
    Json result{{"annulet", version}, {"command", "prove"}};
    Json cases = Json::array();
    for (const auto& c : report.cases) {
        Json entry{{"name", c.name},
                   {"quantity", c.quantity},
                   {"reference", value_json(c, c.reference)},
                   {"computed", value_json(c, c.computed)},
                   {"error", c.error()},
                   {"tolerance", c.tolerance},
                   {"source", c.source},
                   {"judged", c.judged},
                   {"pass", c.judged ? Json(c.pass()) : Json(nullptr)}};
        if (!c.judged) entry["why_not_judged"] = c.why_not;
        cases.push_back(std::move(entry));
    }
    result["cases"] = std::move(cases);
    result["judged"] = report.judged();
    result["failed"] = report.failed();
    result["pass"] = report.pass();
    result["timing_s"] = {{"total", report.total_s}};
    return json_text(result);
}

std::string prove_table(const ProveReport& report) {
    std::string text = fmt::format("{:<5} {:<54} {:<25} {:>20} {:>20} {:>10}\n", "", "case", "quantity", "reference",
                                   "computed", "error");
    for (const auto& c : report.cases) text += line(c);
    text +=
        fmt::format("{} of {} cases pass, {} more are shown only; {:.1f} s\n", report.judged() - report.failed(),
                    report.judged(), report.cases.size() - static_cast<std::size_t>(report.judged()), report.total_s);
    for (const auto& c : report.cases)
        if (!c.pass()) text += fmt::format("FAIL  {}, {}: {}\n", c.name, c.quantity, c.source);
    return text;
}

}  // namespace annulet
