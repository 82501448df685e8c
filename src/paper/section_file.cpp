#include "paper/section_file.hpp"

#include <cstdio>

#include "paper/plan_file.hpp"

namespace gg {
namespace {

void put(std::string& out, const char* format, double value) {
    char text[40];
    std::snprintf(text, sizeof text, format, value);
    out += text;
}

struct Table {
    const char* rows = "";  ///< name of the first column
    int columns = 0, count = 0;
    double first = 0.0, step = 0.0;          ///< m
    double row_first = 0.0, row_step = 0.0;  ///< in the first column's unit
    std::vector<double> values;              ///< column after column
};

std::string written(const Table& table, std::string head) {
    std::string out = std::move(head);
    out += table.rows;
    for (int i = 0; i < table.columns; ++i) put(out, ",%.6g", table.first + i * table.step);
    out += '\n';
    for (int row = 0; row < table.count; ++row) {
        put(out, "%.9g", table.row_first + row * table.row_step);
        for (int i = 0; i < table.columns; ++i)
            put(out, ",%.6g",
                table.values[static_cast<std::size_t>(i) * static_cast<std::size_t>(table.count) +
                             static_cast<std::size_t>(row)]);
        out += '\n';
    }
    return out;
}

std::string head_of(const Plan& plan, const SectionOrder& order) {
    const SectionParts& p = order.parts;
    std::string name = plan.name, parts;
    for (char& c : name)
        if (static_cast<unsigned char>(c) < 0x20) c = ' ';
    for (const auto& [in, word] : {std::pair{p.targets, "targets"}, std::pair{p.layers, "layers"},
                                   std::pair{p.direct, "direct wave"}, std::pair{p.noise, "noise"}})
        if (in) parts += (parts.empty() ? "" : ", ") + std::string(word);
    return "# " + name + "\n# Computed, not measured. Holds: " + parts + ". Electric field " +
           (order.polarisation == Polarisation::along ? "along" : "across") + " the targets, V/m for a source of 1 A" +
           (order.even_gain ? ", even gain" : ", no gain") +
           ". Two-dimensional: levels against depth are no power budget.\n# " + std::string(caution()) + "\n";
}

}  // namespace

std::string write_section(const Plan& plan, const SectionOrder& order, std::string& fault) {
    const Section section = section_for(plan, Detail::exact, order.polarisation);
    fault = section.reason;
    if (!section.ok()) return {};
    const Scene scene = scene_for(plan, Detail::exact, order.polarisation);
    std::vector<double> record = record_of(section, order.parts);
    if (order.even_gain) {
        const std::vector<double> gain = even_gain(scene);
        for (std::size_t i = 0; i < record.size(); ++i) record[i] *= gain[i % gain.size()];
    }
    const std::string head = head_of(plan, order);
    if (!order.focused)
        return written({"time_ns", section.traces, section.samples, section.first, section.step, 1e9 * section.start,
                        1e9 * section.dt, std::move(record)},
                       head);
    Image image = focused(scene, record);
    for (double& value : image.values) value *= image.peak;
    return written(
        {"depth_m", image.traces, image.rows, image.first, image.step, 0.0, image.spacing, std::move(image.values)},
        head);
}

}  // namespace gg
