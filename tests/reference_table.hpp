#pragma once
/// Published numbers as data: tests/reference/*.csv, lines with '#' say the source, then a header line, then rows.
#include <cstdlib>
#include <fstream>
#include <map>
#include <sstream>
#include <string>
#include <vector>

namespace gg::test {

struct ReferenceRow {
    std::map<std::string, std::string> cells;
    std::string text(const std::string& column) const { return cells.at(column); }
    double operator[](const std::string& column) const { return std::strtod(cells.at(column).c_str(), nullptr); }
};

/// Rows of tests/reference/`name`.csv; empty when the file cannot be read, so check the count.
inline std::vector<ReferenceRow> reference_table(const std::string& name) {
    std::ifstream file(std::string(GG_SOURCE_DIR) + "/tests/reference/" + name + ".csv");
    std::vector<std::string> columns;
    std::vector<ReferenceRow> rows;
    for (std::string line; std::getline(file, line);) {
        if (line.empty() || line.front() == '#') continue;
        std::vector<std::string> cells;
        std::stringstream stream(line);
        for (std::string cell; std::getline(stream, cell, ',');) cells.push_back(cell);
        if (columns.empty()) {
            columns = cells;
            continue;
        }
        ReferenceRow row;
        for (std::size_t i = 0; i < columns.size() && i < cells.size(); ++i) row.cells[columns[i]] = cells[i];
        rows.push_back(row);
    }
    return rows;
}

}  // namespace gg::test
