// The steps of `evaluate`: each reads one part of the file into the model and reports its faults.
#pragma once

#include "model/fields.hpp"

#include <annulet/model/model.hpp>

#include <functional>
#include <map>
#include <optional>
#include <set>
#include <string>
#include <vector>

namespace annulet {

struct Heights {
    double top_m;
    double bottom_m;
};

/// A laminate that follows a metal, to be checked when the metals are known.
struct Around {
    std::string metal;
    std::string laminate;
    Position where;
};

struct Reading {
    Context context;
    Model& model;
    std::set<std::string> omit;
    std::map<std::string, Heights> faces{};  ///< of every laminate; NaN when faulty
    std::set<std::string> metal_names{}, wire_names{}, omittable{}, fixed{};
    std::vector<Around> around{};
    bool metals_faulty = false;

    Faults& faults() { return context.faults; }
    bool omitted(const std::string& name) const { return omit.count(name) > 0; }
};

inline const std::vector<std::string> shape_keys{"ring", "path", "polygon", "rectangle", "disc", "sector"};

/// The one shape of a table whose keys `fields` reads; `what` as in "metal 'band'".
std::optional<Shape> read_shape(Fields& fields);
/// A table with nothing but a shape.
std::optional<Shape> read_shape_table(const toml::node& node, const std::string& what, Context& context);
std::optional<StripPath> read_path(const toml::node& node, const std::string& what, Context& context);

/// Height of a key that may be a face ("board.top") or a length; NaN when faulty.
double read_height(const toml::node& node, const std::string& what, Reading& reading);
/// Height of a face "board.top".
double read_face(const toml::node& node, const std::string& what, Reading& reading);
Conductor read_conductor(Fields& fields, bool foil);

void read_laminates(Reading& reading);
void read_metals(Reading& reading);
void read_vias(Reading& reading);
void read_wires(Reading& reading);
void read_ports(Reading& reading);
void read_lumped(Reading& reading);
void read_settings(Reading& reading);
void read_features(Reading& reading);
/// What concerns several items: overlapping laminates, outlines around metal, the ground plane, names to omit.
void check_together(Reading& reading);

/// Calls `read(table, index)` for every table of the list `key` of the file.
void for_each_table(Reading& reading, const char* key,
                    const std::function<void(const toml::table& table, std::size_t index)>& read);

/// Reports names given twice within one kind of item.
class Names {
public:
    Names(const char* kind, Faults& faults) : kind_(kind), faults_(faults) {}
    void add(const std::string& name, Position where);

private:
    const char* kind_;
    Faults& faults_;
    std::map<std::string, int> lines_;
};

}  // namespace annulet
