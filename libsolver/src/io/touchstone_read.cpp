#include <annulet/core/constants.hpp>
#include <annulet/core/diagnostics.hpp>
#include <annulet/io/touchstone.hpp>

#include <fmt/format.h>

#include <algorithm>
#include <cctype>
#include <cmath>
#include <cstdlib>
#include <optional>
#include <sstream>
#include <utility>

namespace annulet {
namespace {

using Complex = std::complex<double>;
using Eigen::Index;
using Eigen::MatrixXcd;
constexpr int most_ports = 1000;

[[noreturn]] void fault(Position where, std::string message, std::string help = "") {
    throw InputError({Diagnostic{Severity::error, where, std::move(message), std::move(help)}});
}

struct Word {
    std::string text;
    Position where;
};

struct Line {
    std::vector<Word> words;
    std::string comment;
    bool has_comment = false;
};

std::string lower(std::string text) {
    std::transform(text.begin(), text.end(), text.begin(),
                   [](unsigned char c) { return static_cast<char>(std::tolower(c)); });
    return text;
}

Line split(const std::string& raw, int number) {
    Line line;
    const auto mark = raw.find('!');
    line.has_comment = mark != std::string::npos;
    if (line.has_comment) line.comment = raw.substr(std::min(raw.size(), mark + (raw[mark + 1] == ' ' ? 2 : 1)));
    const std::string body = raw.substr(0, mark);
    for (std::size_t i = 0; i < body.size();) {
        if (std::isspace(static_cast<unsigned char>(body[i])) != 0) {
            ++i;
            continue;
        }
        auto end = body[i] == '[' ? body.find(']', i) : body.find_first_of(" \t\r\n", i);
        if (body[i] == '[' && end != std::string::npos) ++end;
        end = std::min(end, body.size());
        line.words.push_back({lower(body.substr(i, end - i)), {number, static_cast<int>(i) + 1}});
        i = end;
    }
    return line;
}

double number(const Word& word) {
    char* end = nullptr;
    const double value = std::strtod(word.text.c_str(), &end);
    if (word.text.empty() || *end != '\0') fault(word.where, fmt::format("'{}' is not a number", word.text));
    if (!std::isfinite(value)) fault(word.where, fmt::format("'{}' is not a finite number", word.text));
    return value;
}

enum class Format { decibel, magnitude, real };
enum class Triangle { none, lower, upper };

class Reader {
public:
    explicit Reader(int ports) : ports_(ports) {}

    TouchstoneData read(const std::string& text) {
        std::istringstream stream(text);
        std::string raw;
        for (int line = 1; std::getline(stream, raw); ++line) take(split(raw, line));
        return finish();
    }

private:
    void take(const Line& line) {
        if (line.has_comment && values_.empty()) data_.comments.push_back(line.comment);
        if (line.words.empty() || over_) return;
        const Word& first = line.words.front();
        if (first.text[0] == '#') return options(line.words);
        if (first.text[0] == '[') return keyword(line.words);
        if (awaiting_reference_) return add_references(line.words, 0);
        if (skipping_) return;
        // A version 1 file may append noise data, which start with a lower frequency.
        for (const auto& word : line.words) {
            if (values_.empty()) data_at_ = word.where;
            values_.push_back(number(word));
            places_.push_back(word.where);
        }
        if (!has_options_)
            fault(first.where, "data before the option line", "a line such as '# Hz S RI R 50' comes first");
    }

    void options(std::vector<Word> words) {
        if (std::exchange(has_options_, true)) return;
        words.front().text.erase(0, 1);
        if (words.front().text.empty()) words.erase(words.begin());
        for (std::size_t i = 0; i < words.size(); ++i) {
            const auto& text = words[i].text;
            if (text == "r") {
                for (++i; i < words.size(); ++i) data_.reference_ohm.push_back(positive(words[i]));
            } else if (!unit(text) && !format(text) && text != "s") {
                const bool other = text == "y" || text == "z" || text == "h" || text == "g";
                fault(words[i].where, other ? fmt::format("'{}' parameters: only S parameters are read", text)
                                            : fmt::format("'{}' is no option", text));
            }
        }
    }

    bool unit(const std::string& text) {
        if (text == "hz")
            unit_hz_ = 1;
        else if (text == "khz")
            unit_hz_ = 1e3;
        else if (text == "mhz")
            unit_hz_ = 1e6;
        else if (text == "ghz")
            unit_hz_ = 1e9;
        else
            return false;
        return true;
    }

    bool format(const std::string& text) {
        if (text == "db")
            format_ = Format::decibel;
        else if (text == "ma")
            format_ = Format::magnitude;
        else if (text == "ri")
            format_ = Format::real;
        else
            return false;
        return true;
    }

    static double positive(const Word& word) {
        const double value = number(word);
        if (!(value > 0)) fault(word.where, fmt::format("a reference of {} ohm is not above zero", word.text));
        return value;
    }

    void keyword(const std::vector<Word>& words) {
        const auto& name = words.front().text;
        awaiting_reference_ = false;
        if (name == "[version]")
            version_2_ = true;
        else if (name == "[number of ports]")
            ports_ = static_cast<int>(std::clamp(argument(words), 0.0, 1e6));
        else if (name == "[two-port data order]")
            by_rows_ = words.size() > 1 && words[1].text == "12_21";
        else if (name == "[number of frequencies]")
            frequencies_ = argument(words);
        else if (name == "[reference]") {
            data_.reference_ohm.clear();
            add_references(words, 1);
        } else if (name == "[matrix format]")
            matrix_format(words);
        else if (name == "[mixed-mode order]")
            fault(words.front().where, "mixed-mode parameters are not read");
        else if (name == "[begin information]" || name == "[noise data]")
            skipping_ = true;
        else if (name == "[end information]" || name == "[network data]")
            skipping_ = false;
        else if (name == "[end]")
            over_ = true;
        else if (name != "[number of noise frequencies]")
            fault(words.front().where, fmt::format("unknown keyword {}", name));
    }

    static double argument(const std::vector<Word>& words) {
        if (words.size() != 2) fault(words.front().where, fmt::format("{} takes one number", words.front().text));
        return number(words[1]);
    }

    void matrix_format(const std::vector<Word>& words) {
        const auto kind = words.size() == 2 ? words[1].text : "";
        if (kind == "lower")
            triangle_ = Triangle::lower;
        else if (kind == "upper")
            triangle_ = Triangle::upper;
        else if (kind != "full")
            fault(words.front().where, "the matrix format is Full, Lower or Upper");
    }

    void add_references(const std::vector<Word>& words, std::size_t first) {
        for (std::size_t i = first; i < words.size(); ++i) data_.reference_ohm.push_back(positive(words[i]));
        awaiting_reference_ = static_cast<int>(data_.reference_ohm.size()) < ports_;
    }

    TouchstoneData finish() {
        if (!has_options_) fault({1, 1}, "no option line", "a line such as '# Hz S RI R 50' comes first");
        if (ports_ < 1 || ports_ > most_ports) fault({1, 1}, fmt::format("{} ports", ports_));
        if (version_2_ && !over_) fault({1, 1}, "the file does not end with [End]");
        complete_references();
        for (std::size_t at = 0; at < values_.size();) {
            if (!version_2_ && ports_ == 2 && !data_.frequency_hz.empty() &&
                values_[at] * unit_hz_ < data_.frequency_hz.back())
                break;  // noise data
            at = record(at);
        }
        if (frequencies_ && *frequencies_ != static_cast<double>(data_.frequency_hz.size()))
            fault(data_at_,
                  fmt::format("{} frequencies announced, {} found", *frequencies_, data_.frequency_hz.size()));
        return std::move(data_);
    }

    void complete_references() {
        auto& reference = data_.reference_ohm;
        if (reference.empty()) reference.push_back(50);
        if (reference.size() == 1) reference.assign(static_cast<std::size_t>(ports_), reference.front());
        if (static_cast<int>(reference.size()) != ports_)
            fault({1, 1}, fmt::format("{} references for {} ports", reference.size(), ports_));
    }

    /// One frequency and its matrix from `at`; returns the index behind it.
    std::size_t record(std::size_t at) {
        const auto n = static_cast<std::size_t>(ports_);
        const auto entries = triangle_ == Triangle::none ? n * n : n * (n + 1) / 2;
        if (values_.size() - at < 1 + 2 * entries)
            fault(places_[at], fmt::format("the data of {} ports need {} numbers here, {} are left", ports_,
                                           1 + 2 * entries, values_.size() - at));
        const double frequency_hz = values_[at] * unit_hz_;
        if (!data_.frequency_hz.empty() && !(frequency_hz > data_.frequency_hz.back()))
            fault(places_[at], fmt::format("the frequency {} does not ascend", values_[at]));
        data_.frequency_hz.push_back(frequency_hz);
        data_.scattering.push_back(matrix(at + 1));
        return at + 1 + 2 * entries;
    }

    MatrixXcd matrix(std::size_t at) const {
        MatrixXcd s = MatrixXcd::Zero(ports_, ports_);
        for (Index row = 0; row < s.rows(); ++row)
            for (Index column = 0; column < s.cols(); ++column) {
                if (triangle_ == Triangle::lower && column > row) continue;
                if (triangle_ == Triangle::upper && column < row) continue;
                const Complex value = entry(values_[at], values_[at + 1]);
                at += 2;
                const bool transposed = ports_ == 2 && triangle_ == Triangle::none && !by_rows_;
                (transposed ? s(column, row) : s(row, column)) = value;
                if (triangle_ != Triangle::none) s(column, row) = value;
            }
        return s;
    }

    Complex entry(double first, double second) const {
        if (format_ == Format::real) return {first, second};
        const double size = format_ == Format::decibel ? std::pow(10.0, first / 20) : first;
        return size * std::exp(Complex(0, second * constants::pi / 180));
    }

    int ports_;
    TouchstoneData data_;
    double unit_hz_ = 1e9;
    Format format_ = Format::magnitude;
    Triangle triangle_ = Triangle::none;
    std::optional<double> frequencies_;
    bool has_options_ = false, version_2_ = false, by_rows_ = false, awaiting_reference_ = false;
    bool skipping_ = false, over_ = false;
    std::vector<double> values_;
    std::vector<Position> places_;
    Position data_at_{1, 1};
};

}  // namespace

TouchstoneData read_touchstone(const std::string& text, int ports) {
    return Reader(ports).read(text);
}

}  // namespace annulet
