#include "io/figures.hpp"
#include "io/json_text.hpp"

#include <annulet/io/sweep_result.hpp>

#include <nlohmann/json.hpp>

#include <cmath>

namespace annulet {
namespace {

using Json = nlohmann::ordered_json;
using Complex = std::complex<double>;

Json estimate_or_null(double value) {
    return value > 0 ? Json(value) : Json(nullptr);
}

/// {"real": [...], "imag": [...]} of `entry(point)` over all points.
template <typename Points, typename Entry>
Json complex_series(const Points& points, Entry entry) {
    Json real = Json::array(), imag = Json::array();
    for (const auto& point : points) {
        const Complex value = entry(point);
        real.push_back(value.real());
        imag.push_back(value.imag());
    }
    return {{"real", std::move(real)}, {"imag", std::move(imag)}};
}

Json mesh_json(const SolvedModel& solved) {
    const auto counts = count_cells(solved.op.mesh());
    return {{"unknowns", solved.op.unknowns()},
            {"quadrilaterals", counts.quadrilaterals},
            {"triangles", counts.triangles},
            {"segments", counts.segments},
            {"laminate_cells", counts.laminate}};
}

Json port_json(const PortCurve& curve) {
    const auto reflect = [&](const Complex& impedance) { return reflection(impedance, curve.reference_ohm); };
    Json loss = Json::array(), ratio = Json::array(), mismatch = Json::array();
    for (const auto& impedance : curve.impedance_ohm) {
        loss.push_back(return_loss_db(reflect(impedance)));
        ratio.push_back(vswr(reflect(impedance)));
        mismatch.push_back(mismatch_loss_db(reflect(impedance)));
    }
    return {{"impedance_ohm", complex_series(curve.impedance_ohm, [](const Complex& z) { return z; })},
            {"reflection", complex_series(curve.impedance_ohm, reflect)},
            {"return_loss_db", std::move(loss)},
            {"vswr", std::move(ratio)},
            {"mismatch_loss_db", std::move(mismatch)}};
}

/// One of the matrices of `NetworkPoint`, by the names of its row's and its column's port.
Json matrix_json(const SolvedModel& solved, Eigen::MatrixXcd NetworkPoint::*matrix) {
    Json rows = Json::object();
    for (std::size_t row = 0; row < solved.curves.size(); ++row)
        for (std::size_t column = 0; column < solved.curves.size(); ++column)
            rows[solved.curves[row].port][solved.curves[column].port] =
                complex_series(solved.network, [&](const NetworkPoint& point) {
                    return (point.*matrix)(static_cast<Eigen::Index>(row), static_cast<Eigen::Index>(column));
                });
    return rows;
}

Json resonances_json(const SolvedModel& solved) {
    Json list = Json::array();
    for (const auto& found : solved.resonances)
        list.push_back({{"port", found.port},
                        {"kind", kind_name(found.kind)},
                        {"frequency_hz", found.frequency_hz},
                        {"resistance_ohm", found.resistance_ohm},
                        {"q", found.q},
                        {"q_mode", estimate_or_null(found.q_mode)},
                        {"bandwidth_hz", found.bandwidth_hz},
                        {"uncertainty_hz", estimate_or_null(found.uncertainty_hz)}});
    return list;
}

Json quality_json(const SolvedModel& solved) {
    Json balances = Json::array();
    for (const PowerBalance& balance : solved.balances)
        balances.push_back({{"frequency_hz", balance.frequency_hz},
                            {"input_power_w", balance.input_w},
                            {"radiated_power_w", balance.radiated_w},
                            {"loss_w", balance.dissipated_w},
                            {"power_balance", balance.ratio()}});
    return {{"relative_residual", solved.worst.relative_residual},
            {"reciprocal_condition", solved.worst.reciprocal_condition},
            {"port_asymmetry", solved.worst.asymmetry},
            {"power", std::move(balances)}};
}

Json goal_json(const SolvedModel& solved) {
    Json list = Json::array();
    for (const auto& goal : solved.goals)
        list.push_back({{"port", goal.port},
                        {"band_hz", {solved.model.goal.band->from_hz, solved.model.goal.band->to_hz}},
                        {"vswr", solved.model.goal.vswr},
                        {"vswr_worst", goal.match.worst_vswr},
                        {"vswr_worst_at_hz", goal.match.worst_at_hz},
                        {"reached", goal.reached}});
    return list;
}

Json timing_json(const Timing& timing) {
    return {{"mesh", timing.mesh_s},
            {"assemble", timing.assemble_s},
            {"factor", timing.factor_s},
            {"post", timing.post_s},
            {"total", timing.total_s}};
}

Json origin_json(const SolvedModel& solved, const ResultOrigin& origin) {
    return {{"annulet", origin.version},
            {"command", origin.command},
            {"model", {{"title", solved.model.title}, {"file", origin.file}, {"sha256", origin.sha256}}},
            {"parameters", solved.model.parameters_si},
            {"mesh", mesh_json(solved)},
            {"cautions", solved.cautions}};
}

}  // namespace

std::string json_marker() {
    return "{\n  \"annulet\": \"";
}

std::string sweep_json(const SolvedModel& solved, const ResultOrigin& origin) {
    Json result = origin_json(solved, origin);
    result["frequency_hz"] = solved.frequency_hz;
    Json names = Json::array(), ports = Json::object();
    for (const auto& curve : solved.curves) {
        names.push_back(curve.port);
        ports[curve.port] = port_json(curve);
        if (!solved.reflection_uncertainty.empty())
            ports[curve.port]["reflection_uncertainty"] = solved.reflection_uncertainty[names.size() - 1];
    }
    result["ports"] = std::move(names);
    result["reference_ohm"] = solved.reference_ohm;
    result["port"] = std::move(ports);
    if (solved.curves.size() > 1) {
        result["s_parameters"] = matrix_json(solved, &NetworkPoint::scattering);
        result["z_parameters_ohm"] = matrix_json(solved, &NetworkPoint::impedance_ohm);
        result["y_parameters_s"] = matrix_json(solved, &NetworkPoint::admittance_s);
    }
    result["resonances"] = resonances_json(solved);
    result["goal"] = goal_json(solved);
    result["full_solves"] = solved.full_solves;
    result["reflection_error"] = solved.reflection_error;
    result["solved_frequency_hz"] = solved.solved_hz;
    result["quality"] = quality_json(solved);
    result["timing_s"] = timing_json(solved.timing);
    return json_text(result);
}

}  // namespace annulet
