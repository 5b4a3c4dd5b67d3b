// Time to mesh; the counters show what came out, so that a fast wrong answer is seen.
#include <benchmark/benchmark.h>

#include <annulet/mesh/quality.hpp>

namespace annulet {
namespace {

// A plate with holes, about 50,000 triangles at the finest.
void general_plate(benchmark::State& state) {
    Model model;
    Metal plate;
    plate.name = "plate";
    plate.shape = Rectangle{{0, 0}, {0.3, 0.2}, 0};
    model.metals.push_back(plate);
    for (int i = 0; i < 4; ++i) {
        Metal hole;
        hole.name = "hole";
        hole.cut = true;
        hole.shape = Disc{{-0.09 + 0.06 * i, 0.01 * i}, 0.015};
        model.metals.push_back(hole);
    }
    MeshOptions options;
    options.top_frequency_hz = 3e9;
    options.cells_per_wavelength = static_cast<double>(state.range(0));
    MeshQuality quality;
    for (auto _ : state) quality = mesh_quality(make_mesh(model, options), options.top_frequency_hz);
    state.counters["triangles"] = quality.triangles;
    state.counters["quadrilaterals"] = quality.quadrilaterals;
    state.counters["smallest_angle_deg"] = quality.smallest_angle_rad * 57.29578;
}
BENCHMARK(general_plate)->Arg(20)->Arg(60)->Arg(65)->Unit(benchmark::kMillisecond);

}  // namespace
}  // namespace annulet

BENCHMARK_MAIN();
