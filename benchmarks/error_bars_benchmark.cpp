// Do the error bars of resonances cover the truth? Rings and dipoles of many widths; the truth of each is the
// extrapolation [Richardson1911] of a mesh of half the cell size. Ends with status 1 if fewer than 95 % are covered or
// the median half-width is more than five true errors.
#include <annulet/model/drawing.hpp>
#include <annulet/study/converge.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <cmath>
#include <cstdio>
#include <string>
#include <vector>

namespace {

using namespace annulet;

struct Case {
    std::string name, text;
};

std::string sweep(double from_mhz, double to_mhz) {
    return fmt::format("[sweep]\nfrom = \"{} MHz\"\nto = \"{} MHz\"\npoints = 101\n", from_mhz, to_mhz);
}

Case ring(double radius_mm, double width_mm) {
    const double scale = 54 / radius_mm;
    return {fmt::format("ring of {} mm, strip {} mm", radius_mm, width_mm),
            fmt::format("unit = \"mm\"\n[[metal]]\nname = \"band\"\nplane = \"0 mm\"\n"
                        "ring = {{ center = [0, 0], radius = {}, width = {} }}\n"
                        "[[port]]\nname = \"feed\"\nacross = [[{}, 0], [{}, 0]]\ngap = {}\n",
                        radius_mm, width_mm, radius_mm - width_mm / 2, radius_mm + width_mm / 2, 5.65 / scale) +
                sweep(300 * scale, 1400 * scale)};
}

Case dipole(double length_mm, double width_mm) {
    const double half_wave_mhz = 150000 / length_mm;
    return {fmt::format("dipole of {} mm, strip {} mm", length_mm, width_mm),
            fmt::format("unit = \"mm\"\n[[metal]]\nname = \"band\"\nplane = \"0 mm\"\n"
                        "path = {{ width = {}, points = [[{}, 0], [{}, 0]] }}\n"
                        "[[port]]\nname = \"feed\"\nacross = [[0, {}], [0, {}]]\ngap = 3\n",
                        width_mm, -length_mm / 2, length_mm / 2, -width_mm / 2, width_mm / 2) +
                sweep(0.6 * half_wave_mhz, 1.4 * half_wave_mhz)};
}

const Resonance* partner(const Resonance& r, const std::vector<Resonance>& among) {
    const Resonance* best = nullptr;
    const auto away = [&](const Resonance& o) { return std::abs(o.frequency_hz - r.frequency_hz); };
    for (const Resonance& other : among)
        if (other.kind == r.kind && (best == nullptr || away(other) < away(*best))) best = &other;
    return best != nullptr && away(*best) < 0.05 * r.frequency_hz ? best : nullptr;
}

/// Half-widths over true errors of one case.
std::vector<double> measure(const Case& c) {
    const Model model = evaluate(read_drawing(c.text, c.name), {});
    const auto answer = solve_with_error_bars(model, {});
    SolveOptions fine;
    fine.refine = 3;  // the answer's mesh is refined by 1.5
    const auto finest = solve_model(model, fine);
    std::vector<double> ratios;
    for (const Resonance& r : answer.resonances) {
        const Resonance* other = partner(r, finest.resonances);
        if (other == nullptr) continue;
        const double truth = other->frequency_hz + (other->frequency_hz - r.frequency_hz) / 3;
        const double error = std::abs(r.frequency_hz - truth);
        ratios.push_back(r.uncertainty_hz / error);
        std::printf("%-34s %12.6g MHz  +- %8.3g  true error %8.3g  ratio %6.2f\n", c.name.c_str(), r.frequency_hz / 1e6,
                    r.uncertainty_hz / 1e6, error / 1e6, ratios.back());
        std::fflush(stdout);
    }
    return ratios;
}

}  // namespace

int main() {
    std::vector<Case> cases;
    for (const double width : {1.0, 2.0, 3.0, 5.0, 8.0, 10.0}) cases.push_back(ring(54, width));
    for (const double width : {0.5, 1.5, 3.0}) cases.push_back(ring(18, width));
    for (const double width : {1.0, 2.0, 4.0}) cases.push_back(dipole(160, width));
    for (const double width : {1.0, 3.0}) cases.push_back(dipole(60, width));
    std::vector<double> ratios;
    for (const Case& c : cases)
        for (const double ratio : measure(c)) ratios.push_back(ratio);
    std::sort(ratios.begin(), ratios.end());
    const auto covered = std::count_if(ratios.begin(), ratios.end(), [](double r) { return r >= 1; });
    const double share = static_cast<double>(covered) / static_cast<double>(ratios.size());
    const double median = ratios[ratios.size() / 2];
    std::printf("%zu resonances, %.1f %% covered (bound 95 %%), median half-width %.2f true errors (bound 5)\n",
                ratios.size(), 100 * share, median);
    return ratios.size() >= 40 && share >= 0.95 && median <= 5 ? 0 : 1;
}
