// A model file as parsed, and its evaluation to numbers for any choice of parameters.
#pragma once

#include <annulet/model/model.hpp>

#include <map>
#include <memory>
#include <string>
#include <vector>

namespace annulet {

struct ParsedText;  // src/model

/// A parsed model text with the positions of its values. Cheap to copy; nothing in it changes, so one drawing may
/// be evaluated from several threads.
class Drawing {
public:
    explicit Drawing(std::shared_ptr<const ParsedText> parsed);
    const std::string& text() const;
    const std::string& file_name() const;
    const ParsedText& parsed() const { return *parsed_; }
    /// Names of the parameters, alphabetically.
    std::vector<std::string> parameter_names() const;

private:
    std::shared_ptr<const ParsedText> parsed_;
};

/// Parses a model file (TOML 1.0). `file_name` is for messages only. Throws InputError for faults of syntax and
/// texts above 4 MB.
Drawing read_drawing(std::string text, std::string file_name);

/// Numbers of the model, in SI. `set` overrides parameters (name to the text of a value, as "8.5 mm", "8.5" or an
/// expression; a bare number keeps the unit that the parameter is written with); `omit` leaves out the metals, vias,
/// wires, laminates and lumped parts of these names. Throws InputError with every fault of the file.
Model evaluate(const Drawing& drawing, const std::map<std::string, std::string>& set = {},
               const std::vector<std::string>& omit = {});

}  // namespace annulet
