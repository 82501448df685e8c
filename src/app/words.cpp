#include "app/words.hpp"

#include <algorithm>
#include <cmath>
#include <optional>

#include "draw/figure.hpp"
#include "paper/plan_file.hpp"

namespace gg {

namespace {

constexpr unsigned bit(Command command) { return static_cast<unsigned>(command); }
constexpr unsigned everywhere = 0xff;

struct CommandRow {
    Command command;
    const char *name, *words;  ///< `words`: what must follow it; in [ ] what may
    const char* says;
};
constexpr CommandRow commands[] = {
    {Command::answers, "answers", "PLAN", "every answer as JSON: values in SI, low and high, grade, reason, source"},
    {Command::picture, "picture", "PLAN VIEW", "a picture as SVG"},
    {Command::section, "section", "PLAN",
     "what the radar would record over the targets, as CSV: time in ns, then one column per antenna position in m"},
    {Command::check, "check", "PLAN",
     "what is thin or poor, in sentences; exit 0 fine, 1 something poor or at fault, 2 unreadable"},
    {Command::demo, "demo", "[NAME]", "the demo plans by name, or one of them as a plan file to start from"}};

std::optional<double> number(const std::string& text) {
    const auto value = read_number(text, Quantity::none, UnitSystem::metric);
    return value && std::isfinite(*value) ? value : std::nullopt;
}

/// "820x640" as two numbers from 80 to 10000.
bool read_size(const std::string& text, double& width, double& height) {
    const std::size_t cross = text.find('x');
    if (cross == std::string::npos) return false;
    const auto w = number(text.substr(0, cross)), h = number(text.substr(cross + 1));
    if (!w || !h || !(*w >= 80 && *w <= 10000 && *h >= 80 && *h <= 10000)) return false;
    width = *w;
    height = *h;
    return true;
}

/// "targets,noise" and the like; at least one, each known.
bool read_parts(const std::string& text, SectionParts& parts) {
    parts = {false, false, false, false};
    for (std::size_t from = 0; from <= text.size();) {
        const std::size_t comma = std::min(text.find(',', from), text.size());
        const std::string word = text.substr(from, comma - from);
        bool* part = word == "targets"  ? &parts.targets
                     : word == "layers" ? &parts.layers
                     : word == "direct" ? &parts.direct
                     : word == "noise"  ? &parts.noise
                                        : nullptr;
        if (!part) return false;
        *part = true;
        from = comma + 1;
    }
    return true;
}

struct OptionRow {
    const char *name, *value;  ///< `value`: name of the word that follows it, or null
    unsigned where;            ///< commands that take it
    const char* says;
    /// Takes the value; false when it makes no sense, and `says` then tells what would.
    bool (*take)(Order& order, const std::string& value);
};
const OptionRow options[] = {
    {"-o", "FILE",
     bit(Command::answers) | bit(Command::picture) | bit(Command::section) | bit(Command::check) | bit(Command::demo),
     "writes to FILE instead of standard output",
     [](Order& order, const std::string& value) {
         order.output = value;
         return !value.empty();
     }},
    {"--size", "WxH", bit(Command::picture) | bit(Command::window),
     "size of the picture or window in pixels, 80x80 to 10000x10000",
     [](Order& order, const std::string& value) {
         if (!read_size(value, order.width, order.height)) return false;
         order.window.width = static_cast<int>(order.width);
         order.window.height = static_cast<int>(order.height);
         return true;
     }},
    {"--dark", nullptr, bit(Command::picture) | bit(Command::window), "the dark theme",
     [](Order& order, const std::string&) { return order.dark = order.window.dark = true; }},
    {"--imperial", nullptr, bit(Command::picture) | bit(Command::check), "feet and inches in pictures and sentences",
     [](Order& order, const std::string&) {
         order.units = UnitSystem::imperial;
         return true;
     }},
    {"--include", "LIST", bit(Command::section),
     "what the section holds, commas between: targets, layers, direct, noise; else targets,layers",
     [](Order& order, const std::string& value) { return read_parts(value, order.section.parts); }},
    {"--field", "WAY", bit(Command::section) | bit(Command::picture),
     "electric field along or across the targets; else along",
     [](Order& order, const std::string& value) {
         order.section.polarisation = value == "across" ? Polarisation::across : Polarisation::along;
         return value == "along" || value == "across";
     }},
    {"--gain", "WAY", bit(Command::section),
     "off, or even: what the ground and the spreading took is given back along each trace; else off",
     [](Order& order, const std::string& value) {
         order.section.even_gain = value == "even";
         return value == "off" || value == "even";
     }},
    {"--focused", nullptr, bit(Command::section), "hyperbolas folded back (migration): depth in m instead of time",
     [](Order& order, const std::string&) { return order.section.focused = true; }},
    {"--scale", "S", bit(Command::window), "pixels of the window to one of the layout, 0.5 to 4; else the monitor's",
     [](Order& order, const std::string& value) {
         order.window.scale = number(value).value_or(0.0);
         return order.window.scale >= 0.5 && order.window.scale <= 4.0;
     }},
    {"--script", "FILE", bit(Command::window), "plays pointer and keys from FILE, one act a line, before anything else",
     [](Order& order, const std::string& value) {
         order.window.script_file = value;
         return !value.empty();
     }},
    {"--shot", "FILE", bit(Command::window), "writes a picture of the window to FILE (PPM), then closes",
     [](Order& order, const std::string& value) {
         order.window.shot_file = value;
         return !value.empty();
     }},
    {"--help", nullptr, everywhere, "this page",
     [](Order& order, const std::string&) {
         order.command = Command::help;
         return true;
     }},
    {"--version", nullptr, everywhere, "name and version", [](Order& order, const std::string&) {
         order.command = Command::version;
         return true;
     }}};

const CommandRow* find_command(const std::string& name) {
    const auto row = std::find_if(std::begin(commands), std::end(commands), [&](auto& c) { return c.name == name; });
    return row == std::end(commands) ? nullptr : row;
}
const OptionRow* find_option(const std::string& name) {
    if (name == "-h") return find_option("--help");
    const auto row = std::find_if(std::begin(options), std::end(options), [&](auto& o) { return o.name == name; });
    return row == std::end(options) ? nullptr : row;
}

std::string view_names() {
    std::string names;
    for (const ViewRow& view : views()) names += (names.empty() ? "" : ", ") + std::string(view.id);
    return names;
}

std::string take_places(Order& order, const std::vector<std::string>& places) {
    const auto row =
        std::find_if(std::begin(commands), std::end(commands), [&](auto& c) { return c.command == order.command; });
    const std::string name = row == std::end(commands) ? "the window" : row->name;
    const std::size_t most = order.command == Command::picture ? 2 : 1;
    const bool may_be_none = order.command == Command::window || order.command == Command::demo;
    if (places.empty() && !may_be_none)
        return name + " needs a plan file (or - for standard input): groundgrain " + name + " " + row->words;
    if (order.command == Command::picture && places.size() < 2)
        return "picture needs a view as well, one of " + view_names() + ": groundgrain picture PLAN VIEW";
    if (places.size() > most) return name + " does not know what to do with \"" + places[most] + "\".";
    if (!places.empty()) order.plan = order.window.plan_file = places[0];
    if (places.size() > 1) {
        order.view = places[1];
        const auto same = [&](const ViewRow& view) { return view.id == order.view; };
        if (std::none_of(views().begin(), views().end(), same))
            return "There is no view \"" + order.view + "\"; there are " + view_names() + ".";
    }
    return {};
}

}  // namespace

Order understand(const std::vector<std::string>& words) {
    Order order;
    std::vector<std::string> places;
    std::vector<const OptionRow*> taken;
    bool first = true, only_places = false;
    for (std::size_t i = 0; i < words.size(); ++i) {
        const std::string& word = words[i];
        if (word == "--" && !only_places) {
            only_places = true;
        } else if (only_places || word == "-" || !word.starts_with("-")) {
            const CommandRow* row = first && !only_places ? find_command(word) : nullptr;
            if (row)
                order.command = row->command;
            else
                places.push_back(word);
            first = false;
        } else if (const OptionRow* row = find_option(word); !row) {
            order.fault = "There is no option \"" + word + "\"; groundgrain --help lists them.";
            return order;
        } else if (row->value && i + 1 == words.size()) {
            order.fault = word + " needs a " + row->value + " after it: " + row->says + ".";
            return order;
        } else {
            if (!row->take(order, row->value ? words[++i] : "")) {
                order.fault = word + " cannot be \"" + words[i] + "\": " + row->says + ".";
                return order;
            }
            if (order.command == Command::help || order.command == Command::version) return order;
            taken.push_back(row);
        }
    }
    for (const OptionRow* row : taken)
        if (!(row->where & bit(order.command)))
            order.fault =
                std::string(row->name) + " does not go with this command; groundgrain --help lists what does.";
    if (order.fault.empty()) order.fault = take_places(order, places);
    return order;
}

std::string help_text() {
    const auto line = [](std::string left, const std::string& right) {
        left.resize(std::max<std::size_t>(left.size() + 2, 22), ' ');
        return "  " + left + right + "\n";
    };
    std::string text =
        "Groundgrain plans a ground-penetrating-radar survey by how fine a picture of the ground it will give.\n\n"
        "groundgrain [PLAN]              opens the window, with that plan\n"
        "groundgrain COMMAND ... [OPTIONS]\n\nCommands\n";
    for (const CommandRow& row : commands) text += line(std::string(row.name) + " " + row.words, row.says);
    text += "\nPLAN is a plan file, or - for standard input. VIEW is one of\n";
    for (const ViewRow& view : views()) text += line(view.id, view.says);
    text += "\nOptions\n";
    for (const OptionRow& row : options) {
        std::string goes_with;
        if (row.where == bit(Command::window)) goes_with = " (window)";
        text += line(std::string(row.name) + (row.value ? std::string(" ") + row.value : ""), row.says + goes_with);
    }
    text +=
        "\nExamples\n"
        "  groundgrain demo yard-pipe -o plan.json          a plan to start from; it is JSON, change it as you like\n"
        "  groundgrain check plan.json                      what that survey will not show, and what would mend it\n"
        "  groundgrain picture plan.json beam -o beam.svg   the cut through the ground\n"
        "  groundgrain section plan.json -o section.csv     the traces themselves, for another program\n"
        "  groundgrain answers plan.json | less             every number, with its reason and its source\n\n";
    return text + std::string(caution()) + "\n";
}

}  // namespace gg
