#include <annulet/io/sweep_result.hpp>
#include <annulet/io/touchstone.hpp>

#include <fmt/format.h>

#include <cmath>

namespace annulet {
namespace {

/// Quoted where RFC 4180 asks for it.
std::string csv_field(const std::string& text) {
    if (text.find_first_of(",\"\r\n") == std::string::npos) return text;
    std::string quoted = "\"";
    for (const char c : text) quoted += c == '"' ? std::string("\"\"") : std::string(1, c);
    return quoted + "\"";
}

/// Empty where the value does not exist.
std::string csv_number(double value) {
    return std::isfinite(value) ? fmt::format("{:.12g}", value) : std::string();
}

std::string csv_row(double frequency_hz, const std::string& port, const std::complex<double>& impedance_ohm,
                    double reference_ohm) {
    const auto s = reflection(impedance_ohm, reference_ohm);
    std::string row = fmt::format("{},{}", frequency_hz, csv_field(port));
    for (const double value : {impedance_ohm.real(), impedance_ohm.imag(), s.real(), s.imag(), return_loss_db(s),
                               vswr(s), mismatch_loss_db(s)})
        row += "," + csv_number(value);
    return row + "\r\n";
}

}  // namespace

std::string sweep_csv_header() {
    return "frequency_hz,port,resistance_ohm,reactance_ohm,reflection_real,reflection_imag,return_loss_db,vswr,"
           "mismatch_loss_db\r\n";
}

std::string sweep_csv(const SolvedModel& solved) {
    std::string text = sweep_csv_header();
    for (std::size_t i = 0; i < solved.frequency_hz.size(); ++i)
        for (const auto& curve : solved.curves)
            text += csv_row(solved.frequency_hz[i], curve.port, curve.impedance_ohm[i], curve.reference_ohm);
    return text;
}

std::string touchstone_marker() {
    return "! annulet ";
}

std::string sweep_touchstone(const SolvedModel& solved, const ResultOrigin& origin) {
    TouchstoneData data;
    data.frequency_hz = solved.frequency_hz;
    data.reference_ohm = solved.reference_ohm;
    for (const auto& point : solved.network) data.scattering.push_back(point.scattering);
    data.comments = {fmt::format("annulet {} {}", origin.version, origin.command), solved.model.title,
                     fmt::format("model {} sha256 {}", origin.file, origin.sha256)};
    for (std::size_t p = 0; p < solved.curves.size(); ++p)
        data.comments.push_back(fmt::format("port {}: {}", p + 1, solved.curves[p].port));
    for (const auto& caution : solved.cautions) data.comments.push_back("caution: " + caution);
    return touchstone_text(data);
}

}  // namespace annulet
