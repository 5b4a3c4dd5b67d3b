#include "io/figures.hpp"

#include <annulet/io/sweep_result.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <cmath>

namespace annulet {
namespace {

constexpr std::size_t columns = 100;
constexpr std::size_t margin = 12;

/// Control characters of a name must not reach a terminal.
std::string harmless(std::string text) {
    std::replace_if(
        text.begin(), text.end(), [](unsigned char c) { return c < ' ' || c == 0x7F; }, ' ');
    return text;
}

/// "Label       text", broken between words, continued under the text.
std::string entry(const std::string& label, const std::string& text) {
    std::string result = fmt::format("{:<{}}", label, margin);
    std::size_t column = margin;
    for (std::size_t at = 0; at < text.size();) {
        const auto end = std::min(text.find(' ', at), text.size());
        const bool full = column > margin && column + 1 + end - at > columns;
        if (full) {
            result += "\n" + std::string(margin, ' ');
            column = margin;
        }
        if (column > margin) result += ' ';
        result += text.substr(at, end - at);
        column += end - at + 1;
        at = end + 1;
    }
    return result + "\n";
}

std::string count(int number, const std::string& what) {
    return fmt::format("{} {}{}", number, what, number == 1 ? "" : "s");
}

std::string mesh_line(const SolvedModel& solved) {
    const auto counts = count_cells(solved.op.mesh());
    std::string cells;
    const auto add = [&cells](int number, const char* what) {
        if (number > 0) cells += (cells.empty() ? "" : ", ") + count(number, what);
    };
    add(counts.quadrilaterals, "quadrilateral");
    add(counts.triangles, "triangle");
    add(counts.segments, "segment");
    add(counts.laminate, "laminate cell");
    return entry("Mesh", count(solved.op.unknowns(), "unknown") + " on " + cells);
}

std::string sweep_line(const SolvedModel& solved) {
    const auto& f = solved.frequency_hz;
    const std::string range = f.size() == 1 ? engineering(f.front(), "Hz", 6)
                                            : engineering(f.front(), "Hz", 6) + " to " + engineering(f.back(), "Hz", 6);
    const std::string error =
        solved.reflection_error > 0 ? fmt::format(", |S11| within {:.0e}", solved.reflection_error) : std::string();
    return entry("Sweep", fmt::format("{}, {}, {}{}", range, count(static_cast<int>(f.size()), "point"),
                                      count(solved.full_solves, "full solve"), error));
}

std::string ratio(double vswr) {
    return vswr < 1000 ? fmt::format("{:.3g}", vswr) : std::string("over 1000");
}

std::string resonance_table(const SolvedModel& solved, const PortCurve& curve) {
    std::string table;
    for (const auto& found : solved.resonances) {
        if (found.port != curve.port) continue;
        table += fmt::format("  {:<9} {:>12} {:>9} {:>13} {:>10.3g}   {}\n", kind_name(found.kind),
                             engineering(found.frequency_hz, "Hz", 5),
                             found.uncertainty_hz > 0
                                 ? fmt::format("{:.2g} %", 100 * found.uncertainty_hz / found.frequency_hz)
                                 : std::string("-"),
                             engineering(found.resistance_ohm, "ohm"), found.q,
                             found.bandwidth_hz > 0 ? engineering(found.bandwidth_hz, "Hz", 3) : "-");
    }
    if (table.empty()) return "  no resonance in this range\n";
    return fmt::format("  {:<9} {:>12} {:>9} {:>13} {:>10}   below VSWR {:.3g}\n", "resonance", "frequency", "+-",
                       "resistance", "Q", solved.model.goal.vswr) +
           table;
}

std::string best_match(const PortCurve& curve) {
    std::size_t best = 0;
    const auto size = [&](std::size_t i) { return std::abs(reflection(curve.impedance_ohm[i], curve.reference_ohm)); };
    for (std::size_t i = 1; i < curve.impedance_ohm.size(); ++i)
        if (size(i) < size(best)) best = i;
    const auto s = reflection(curve.impedance_ohm[best], curve.reference_ohm);
    const auto z = curve.impedance_ohm[best];
    return entry("  best",
                 fmt::format("VSWR {} (return loss {:.1f} dB) at {}, where Z = {:.4g} {} j{:.4g} ohm", ratio(vswr(s)),
                             return_loss_db(s), engineering(curve.frequency_hz[best], "Hz", 5), z.real(),
                             z.imag() < 0 ? '-' : '+', std::abs(z.imag())));
}

std::string goal_line(const SolvedModel& solved, const PortGoal& goal) {
    const auto& band = *solved.model.goal.band;
    return entry("  goal", fmt::format("VSWR {} at worst (at {}) from {} to {}: {} the goal of {:.3g}",
                                       ratio(goal.match.worst_vswr), engineering(goal.match.worst_at_hz, "Hz", 5),
                                       engineering(band.from_hz, "Hz", 5), engineering(band.to_hz, "Hz", 5),
                                       goal.reached ? "meets" : "misses", solved.model.goal.vswr));
}

std::string port_block(const SolvedModel& solved, const PortCurve& curve) {
    std::string block = fmt::format("Port '{}', {:.4g} ohm\n", harmless(curve.port), curve.reference_ohm);
    block += resonance_table(solved, curve) + best_match(curve);
    for (const auto& goal : solved.goals)
        if (goal.port == curve.port) block += goal_line(solved, goal);
    return block;
}

std::string quality_line(const SolvedModel& solved) {
    std::string balance;
    for (const PowerBalance& found : solved.balances)
        balance += fmt::format("{}{:.4f}", balance.empty() ? ", power balance " : " ", found.ratio());
    return entry("Quality",
                 fmt::format("worst relative residual {:.1e}, worst condition number {:.1e}{}",
                             solved.worst.relative_residual, 1 / solved.worst.reciprocal_condition, balance));
}

}  // namespace

std::string sweep_summary(const SolvedModel& solved, const ResultOrigin& origin) {
    std::string text = harmless(solved.model.title.empty() ? origin.file : solved.model.title) + "\n\n";
    text += entry("Model", harmless(origin.file)) + mesh_line(solved) + sweep_line(solved);
    for (const auto& curve : solved.curves) text += "\n" + port_block(solved, curve);
    text += "\n" + quality_line(solved);
    for (const auto& caution : solved.cautions) text += entry("Caution", harmless(caution));
    return text;
}

}  // namespace annulet
