// Where a region (a cut or a slit) crosses a strip from edge to edge.
#pragma once

#include <annulet/geometry/region.hpp>
#include <annulet/geometry/ribbon.hpp>

#include <memory>
#include <vector>

namespace annulet {

/// Values of tau at which crossings are followed over the width.
std::vector<double> probe_taus();

/// One crossing: for every tau the stretch (enter, exit) of s inside the region. On a closed strip exit may lie
/// beyond the length.
class Track {
public:
    struct Side {
        bool fixed = false;  ///< the region reaches beyond the end of the strip
        double fixed_s_m = 0;
        std::vector<double> probe_s_m;  ///< at probe_taus()
    };
    Track(std::shared_ptr<const Ribbon> ribbon, std::shared_ptr<const Region> region, Side enter, Side exit)
        : ribbon_(std::move(ribbon)), region_(std::move(region)), enter_(std::move(enter)), exit_(std::move(exit)) {}

    double enter_s_m(double tau) const { return solve(enter_, tau); }
    double exit_s_m(double tau) const { return solve(exit_, tau); }
    bool from_start() const { return enter_.fixed; }
    bool to_end() const { return exit_.fixed; }

private:
    double solve(const Side& side, double tau) const;

    std::shared_ptr<const Ribbon> ribbon_;
    std::shared_ptr<const Region> region_;
    Side enter_, exit_;
};

enum class Crossing { none, full, partial, everything };

struct Crossings {
    Crossing kind = Crossing::none;
    std::vector<Track> tracks;  ///< of full crossings, in order of s
};

/// `partial`: the region enters the strip without dividing it (a notch, a hole, an end cut off askew).
Crossings find_crossings(std::shared_ptr<const Ribbon> ribbon, std::shared_ptr<const Region> region);

}  // namespace annulet
