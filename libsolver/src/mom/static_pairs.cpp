#include "mom/static_pairs.hpp"

#include "mom/outer_rule.hpp"

namespace annulet {

namespace {

/// Local functions that the roles lack, and the vertical flux that a layer has on top: along z, the thickness times a
/// unit charge density; mirrored it points down.
void fit_roles(const Element& test, const Element& source, bool image, PairMoments& m) {
    const auto n_test = static_cast<std::size_t>(test.corners()), n_source = static_cast<std::size_t>(source.corners());
    if (test.role == ElementRole::panel || source.role == ElementRole::panel) m.vector = {};
    if (test.role == ElementRole::layer && source.role == ElementRole::layer)
        m.vector[n_test][n_source] = (image ? -1 : 1) * test.thickness_m * source.thickness_m * m.scalar;
}

}  // namespace

StaticPairs::StaticPairs(const std::vector<Element>& elements, std::optional<double> ground_plane_m)
    : elements_(elements) {
    for (const Element& element : elements) {
        const bool planar = element.kind != CellKind::segment;
        planar_.push_back(planar ? planar_element(element) : PlanarElement{});
        if (ground_plane_m) planar_image_.push_back(planar ? planar_.back().mirrored(*ground_plane_m) : PlanarElement{});
    }
}

PairMoments StaticPairs::moments(int test, int source, bool image) const {
    const auto i = static_cast<std::size_t>(test), j = static_cast<std::size_t>(source);
    const PlanarElement& t = planar_[i];
    const PlanarElement& s = (image ? planar_image_ : planar_)[j];
    PairMoments m = static_pair(t, s, distance(t, s) < 0.5 * t.diameter());
    fit_roles(elements_[i], elements_[j], image, m);
    return m;
}

}  // namespace annulet
