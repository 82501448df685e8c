#include "app/command_line.hpp"

#include <array>
#include <cerrno>
#include <cstring>
#include <fstream>
#include <istream>
#include <optional>
#include <ostream>
#include <sstream>

#include "app/words.hpp"
#include "draw/figure.hpp"
#include "draw/svg_canvas.hpp"
#include "paper/plan_file.hpp"
#include "survey/answers.hpp"

namespace gg {

namespace {

/// A little over what a plan may have: the reader then says that it is too large.
constexpr std::size_t most_bytes = 1'100'000;

struct Streams {
    std::istream& in;
    std::ostream& out;
    std::ostream& err;
};

int complain(const Streams& streams, const std::string& sentence) {
    streams.err << "groundgrain: " << sentence << "\n";
    return exit_failed;
}

std::optional<std::string> read_all(std::istream& in) {
    std::string bytes;
    std::array<char, 65536> block;
    while (bytes.size() < most_bytes) {
        in.read(block.data(), block.size());
        bytes.append(block.data(), static_cast<std::size_t>(in.gcount()));
        if (in.bad()) return std::nullopt;
        if (!in) break;
    }
    return bytes;
}

/// The plan of an order, or nothing once the reason stands on the error stream.
std::optional<Plan> plan_of(const Order& order, const Streams& streams) {
    std::optional<std::string> bytes;
    const bool standard = order.plan == "-";
    if (standard) {
        bytes = read_all(streams.in);
    } else {
        errno = 0;
        std::ifstream file(order.plan, std::ios::binary);
        if (file) bytes = read_all(file);
    }
    if (!bytes) {
        complain(streams, "Cannot read " + (standard ? "standard input" : order.plan) +
                              (errno ? std::string(": ") + std::strerror(errno) : "") + ".");
        return std::nullopt;
    }
    const ReadPlan read = read_plan(*bytes);
    for (const std::string& fault : read.faults) complain(streams, order.plan + ": " + fault);
    if (!read.ok()) return std::nullopt;
    for (const std::string& note : read.notes) streams.err << "note: " << note << "\n";
    return read.plan;
}

int give(const Order& order, const Streams& streams, const std::string& text, int status = exit_fine) {
    if (order.output.empty()) {
        streams.out << text << std::flush;
        return streams.out ? status : complain(streams, "Standard output takes no more.");
    }
    errno = 0;
    std::ofstream file(order.output, std::ios::binary);
    file << text;
    file.close();
    if (file) return status;
    return complain(streams,
                    "Cannot write " + order.output + (errno ? std::string(": ") + std::strerror(errno) : "") + ".");
}

/// `words` over as many lines as they need, upwards from the bottom of `box`; gives the height used.
double footer(Canvas& canvas, Box box, std::string_view words, const TextStyle& style) {
    std::vector<std::string> lines{""};
    std::istringstream all{std::string(words)};
    for (std::string word; all >> word;) {
        const std::string longer = lines.back().empty() ? word : lines.back() + " " + word;
        if (!lines.back().empty() && canvas.measure(longer, style) > box.width)
            lines.push_back(word);
        else
            lines.back() = longer;
    }
    const double leading = 1.35 * style.size;
    double y = box.bottom() - leading * static_cast<double>(lines.size() - 1);
    for (const std::string& line : lines) {
        canvas.text({box.x, y}, line, style);
        y += leading;
    }
    return leading * static_cast<double>(lines.size());
}

std::string picture(const Order& order, const Plan& plan) {
    Answers answers = answers_for(plan);
    const ViewRow* view = nullptr;
    for (const ViewRow& row : views())
        if (row.id == order.view) view = &row;
    const Palette& colours = palette(order.dark);
    SvgCanvas svg(order.width, order.height, plan.name + ": " + view->name);
    Canvas& canvas = svg;
    canvas.box({0, 0, order.width, order.height}, colours.paper);
    const double margin = order.width < 400 ? 8 : 16;
    Box inside{margin, margin, order.width - 2 * margin, order.height - 2 * margin};
    const double caution_height =
        footer(canvas, inside, caution(), {colours.soft_ink, 12.0, Across::left, Down::bottom, false});
    TextStyle title{colours.ink, 18.0, Across::left, Down::top, true};
    canvas.push_clip(inside);
    canvas.text({inside.x, inside.y}, plan.name, title);
    canvas.pop_clip();
    FigureStyle style;
    style.box = {inside.x, inside.y + 30, inside.width, std::max(0.0, inside.height - 30 - caution_height - 6)};
    style.dark = order.dark;
    style.units = order.units;
    style.handles = false;
    PairSection section;
    if (view->view == View::pair) {
        section = pair_section(plan, Detail::full, order.section.polarisation);
        add_focused(section);
        add_separation(section, plan);
        if (section.separation) settle(answers, plan, *section.separation);
        style.section = &section;
    }
    svg.describe(view->draw(canvas, plan, answers, style).description);
    return svg.finish();
}

int check(const Order& order, const Plan& plan, const Streams& streams) {
    const Answers answers = settled_answers_for(plan);
    std::string text = plan.name + "\n";
    int good = 0, thin = 0, poor = 0;
    for (const std::string& fault : answers.faults) text += "fault  " + spell(fault, order.units) + "\n";
    for (const Grade grade : {Grade::poor, Grade::thin, Grade::good})
        for (const Answer& answer : answers.list) {
            if (answer.grade != grade) continue;
            ++(grade == Grade::poor ? poor : grade == Grade::thin ? thin : good);
            if (grade == Grade::good) continue;
            std::string word(word_for(grade));
            word.resize(7, ' ');
            text += word + answer.name + ": " + spell(answer.why, order.units) + "\n";
            for (const Mend& mend : answer.mends) text += "       mend: " + spell(mend.words, order.units) + "\n";
        }
    text += std::to_string(good) + " good, " + std::to_string(thin) + " thin, " + std::to_string(poor) + " poor.\n" +
            std::string(caution()) + "\n";
    return give(order, streams, text, poor > 0 || !answers.faults.empty() ? exit_poor : exit_fine);
}

int section(const Order& order, const Plan& plan, const Streams& streams) {
    std::string fault;
    const std::string table = write_section(plan, order.section, fault);
    if (table.empty()) return complain(streams, spell(fault, order.units));
    return give(order, streams, table);
}

int demo(const Order& order, const Streams& streams) {
    std::string names;
    for (const Demo& row : demos()) {
        if (row.id == order.plan) return give(order, streams, row.json);
        std::string id = row.id;
        id.resize(std::max<std::size_t>(id.size() + 2, 16), ' ');
        names += id + row.name + "\n";
    }
    if (order.plan.empty()) return give(order, streams, names);
    return complain(streams, "There is no demo plan \"" + order.plan + "\"; groundgrain demo lists them.");
}

}  // namespace

int run_command_line(const std::vector<std::string>& words, std::istream& in, std::ostream& out, std::ostream& err,
                     const OpenWindow& open_window) {
    const Streams streams{in, out, err};
    const Order order = understand(words);
    if (!order.fault.empty()) return complain(streams, order.fault);
    switch (order.command) {
        case Command::window:
            return open_window(order.window);
        case Command::help:
            return give({}, streams, help_text());
        case Command::version:
            return give({}, streams, "Groundgrain " GG_VERSION "\n");
        case Command::demo:
            return demo(order, streams);
        case Command::answers:
        case Command::picture:
        case Command::section:
        case Command::check:
            break;
    }
    const std::optional<Plan> plan = plan_of(order, streams);
    if (!plan) return exit_failed;
    if (order.command == Command::answers)
        return give(order, streams, write_answers(*plan, settled_answers_for(*plan)));
    if (order.command == Command::picture) return give(order, streams, picture(order, *plan));
    if (order.command == Command::section) return section(order, *plan, streams);
    return check(order, *plan, streams);
}

}  // namespace gg
