#include "paper/pair_bytes.hpp"

#include <charconv>
#include <cmath>
#include <cstring>
#include <type_traits>

#include "paper/plan_file.hpp"

namespace gg {
namespace {

constexpr std::string_view order_mark = "pair", answer_mark = "gg-pair\n";

class Writer {
  public:
    std::string out;
    template <class T>
    void put(T value) {
        static_assert(std::is_arithmetic_v<T> || std::is_enum_v<T>);
        out.append(reinterpret_cast<const char*>(&value), sizeof value);
    }
    void text(std::string_view words) {
        put(static_cast<std::uint32_t>(words.size()));
        out += words;
    }
    void floats(const std::vector<double>& values) {
        put(static_cast<std::uint32_t>(values.size()));
        out.reserve(out.size() + sizeof(float) * values.size());
        for (const double v : values) put(static_cast<float>(v));
    }
    void spread(const Spread& s) {
        value(s.likely);
        put(s.low);
        put(s.high);
    }
    void value(const Value& v) {
        put(v.value);
        put(v.issue);
    }
    void dip(const Dip& d) {
        for (const double v : {d.first, d.second, d.lower_peak, d.depth, d.needed}) put(v);
    }
};

/// Once something was missing or odd, everything reads as nothing and `ok` stays false.
class Reader {
  public:
    explicit Reader(std::string_view bytes) : left_(bytes) {}
    bool ok = true;
    bool at_end() const { return left_.empty(); }

    template <class T>
    T get() {
        T value{};
        const std::string_view bytes = take(sizeof value);
        if (ok) std::memcpy(&value, bytes.data(), sizeof value);
        return value;
    }
    double number() { return finite_or_odd(get<double>()); }
    /// Numbers of an enumeration from 0 to `last`.
    template <class T>
    T one_of(T last) {
        const auto code = get<std::underlying_type_t<T>>();
        ok = ok && code <= static_cast<std::underlying_type_t<T>>(last);
        return ok ? static_cast<T>(code) : T{};
    }
    std::string text() { return std::string(take(get<std::uint32_t>())); }
    std::vector<double> floats() {
        const std::size_t count = get<std::uint32_t>();
        const std::string_view bytes = take(sizeof(float) * count);
        std::vector<double> out(ok ? count : 0);
        for (std::size_t i = 0; i < out.size(); ++i) {
            float v = 0;
            std::memcpy(&v, bytes.data() + sizeof v * i, sizeof v);
            out[i] = finite_or_odd(v);
        }
        return out;
    }
    Spread spread() {
        Spread s;
        s.likely = value();
        s.low = number();
        s.high = number();
        return s;
    }
    Value value() {
        Value v;
        v.value = number();
        v.issue = one_of(Issue::no_solution);
        return v;
    }
    Dip dip() {
        Dip d;
        for (double* v : {&d.first, &d.second, &d.lower_peak, &d.depth, &d.needed}) *v = number();
        return d;
    }

  private:
    std::string_view take(std::size_t count) {
        ok = ok && count <= left_.size();
        if (!ok) return {};
        const std::string_view out = left_.substr(0, count);
        left_.remove_prefix(count);
        return out;
    }
    double finite_or_odd(double v) {
        ok = ok && std::isfinite(v);
        return ok ? v : 0.0;
    }
    std::string_view left_;
};

bool fills(std::size_t size, int columns, int rows) {
    return columns >= 0 && rows >= 0 && size == static_cast<std::uint64_t>(columns) * static_cast<std::uint64_t>(rows);
}

void write_section_part(Writer& to, const PairSection& pair) {
    const Section& s = pair.section;
    to.put(pair.detail);
    to.put(s.issue);
    to.text(s.reason);
    to.put(s.traces);
    to.put(s.samples);
    for (const double v : {s.first, s.step, s.start, s.dt}) to.put(v);
    for (const auto* values : {&s.targets, &s.layers, &s.direct, &s.noise, &pair.arrivals, &pair.gain})
        to.floats(*values);
    to.put(pair.turning.along_db);
    to.put(pair.turning.better);
    to.text(pair.turning.words);
}

void read_section_part(Reader& from, PairSection& pair) {
    Section& s = pair.section;
    pair.detail = from.one_of(Detail::exact);
    s.issue = from.one_of(Issue::no_solution);
    s.reason = from.text();
    s.traces = from.get<int>();
    s.samples = from.get<int>();
    for (double* v : {&s.first, &s.step, &s.start, &s.dt}) *v = from.number();
    for (auto* values : {&s.targets, &s.layers, &s.direct, &s.noise, &pair.arrivals, &pair.gain})
        *values = from.floats();
    pair.turning.along_db = from.number();
    pair.turning.better = from.one_of(Polarisation::across);
    pair.turning.words = from.text();
    if (!s.ok()) {
        from.ok = from.ok && !s.reason.empty() && s.targets.empty() && s.noise.empty();
        return;
    }
    from.ok = from.ok && s.traces > 0 && s.samples > 1 && s.step > 0.0 && s.dt > 0.0 &&
              fills(s.targets.size(), s.traces, s.samples) && fills(s.noise.size(), s.traces, s.samples) &&
              fills(s.layers.size(), s.samples, 1) && fills(s.direct.size(), s.samples, 1) &&
              fills(pair.gain.size(), s.samples, 1) && pair.arrivals.size() > static_cast<std::size_t>(s.traces);
}

void write_image_part(Writer& to, const PairSection& pair) {
    const Image& image = pair.focused;
    to.put(image.issue);
    to.put(image.traces);
    to.put(image.rows);
    for (const double v : {image.first, image.step, image.spacing, image.peak}) to.put(v);
    to.floats(image.values);
    to.floats(pair.focused_gain);
}

void read_image_part(Reader& from, PairSection& pair) {
    Image& image = pair.focused;
    image.issue = from.one_of(Issue::no_solution);
    image.traces = from.get<int>();
    image.rows = from.get<int>();
    for (double* v : {&image.first, &image.step, &image.spacing, &image.peak}) *v = from.number();
    image.values = from.floats();
    pair.focused_gain = from.floats();
    from.ok = from.ok && fills(image.values.size(), image.traces, image.rows) &&
              fills(pair.focused_gain.size(), image.rows, 1) &&
              (image.rows == 0 || (image.step > 0.0 && image.spacing > 0.0));
}

}  // namespace

std::string write_order(const PairOrder& order) {
    std::string out(order_mark);
    for (const unsigned v : {order.number, static_cast<unsigned>(order.step), static_cast<unsigned>(order.field)})
        out += " " + std::to_string(v);
    return out + "\n" + write_plan(order.plan);
}

std::optional<PairOrder> read_order(std::string_view bytes) {
    const std::size_t end = bytes.find('\n');
    if (end == std::string_view::npos || !bytes.starts_with(order_mark)) return {};
    std::uint32_t numbers[3] = {};
    const char *at = bytes.data() + order_mark.size(), *const last = bytes.data() + end;
    for (std::uint32_t& number : numbers) {
        if (at == last || *at != ' ') return {};
        const auto [next, wrong] = std::from_chars(at + 1, last, number);
        if (wrong != std::errc()) return {};
        at = next;
    }
    if (at != last || numbers[1] > static_cast<unsigned>(PairStep::all) ||
        numbers[2] > static_cast<unsigned>(Polarisation::across))
        return {};
    ReadPlan read = read_plan(bytes.substr(end + 1));
    if (!read.ok()) return {};
    return PairOrder{numbers[0], static_cast<PairStep>(numbers[1]), static_cast<Polarisation>(numbers[2]),
                     std::move(read.plan)};
}

std::string write_answer(std::uint32_t number, PairStep step, const PairSection& pair) {
    Writer to;
    to.out = answer_mark;
    to.put(number);
    to.put(step);
    if (step <= PairStep::full) write_section_part(to, pair);
    if (step == PairStep::focused) write_image_part(to, pair);
    to.put<std::uint8_t>(pair.separation ? 1 : 0);
    if (const auto& s = pair.separation) {
        to.put(s->known);
        to.dip(s->raw);
        to.dip(s->focused);
        to.value(s->least_raw);
        to.value(s->least_focused);
        for (const Spread* spread : {&s->range_raw, &s->range_focused, &s->above, &s->through}) to.spread(*spread);
    }
    return std::move(to.out);
}

std::optional<PairAnswer> read_answer(std::string_view bytes) {
    if (!bytes.starts_with(answer_mark)) return {};
    Reader from(bytes.substr(answer_mark.size()));
    PairAnswer out;
    out.number = from.get<std::uint32_t>();
    out.step = from.one_of(PairStep::all);
    if (!from.ok) return {};
    if (out.step <= PairStep::full) read_section_part(from, out.pair);
    if (out.step == PairStep::focused) read_image_part(from, out.pair);
    const auto measured = from.get<std::uint8_t>();
    if (measured == 1) {
        Separation& s = out.pair.separation.emplace();
        s.known = from.one_of(Separation::Known::all);
        s.raw = from.dip();
        s.focused = from.dip();
        s.least_raw = from.value();
        s.least_focused = from.value();
        for (Spread* spread : {&s.range_raw, &s.range_focused, &s.above, &s.through}) *spread = from.spread();
    }
    if (!from.ok || measured > 1 || !from.at_end()) return {};
    return out;
}

}  // namespace gg
