#include "draw/png.hpp"

#include <algorithm>
#include <cstdint>

namespace gg {
namespace {

void put32(std::string& out, std::uint32_t x) {
    for (int shift = 24; shift >= 0; shift -= 8) out += static_cast<char>(x >> shift & 255);
}

std::uint32_t crc_of(std::string_view bytes) {
    std::uint32_t crc = 0xffffffffu;
    for (const char c : bytes) {
        crc ^= static_cast<unsigned char>(c);
        for (int bit = 0; bit < 8; ++bit) crc = crc & 1u ? 0xedb88320u ^ crc >> 1 : crc >> 1;
    }
    return ~crc;
}

std::uint32_t adler_of(std::string_view bytes) {
    std::uint32_t a = 1, b = 0;
    for (const char c : bytes) {
        a = (a + static_cast<unsigned char>(c)) % 65521;
        b = (b + a) % 65521;
    }
    return b << 16 | a;
}

void chunk(std::string& out, std::string_view type, std::string_view data) {
    put32(out, static_cast<std::uint32_t>(data.size()));
    const std::string body = std::string(type) + std::string(data);
    out += body;
    put32(out, crc_of(body));
}

/// zlib stream (RFC 1950) of stored blocks (RFC 1951, 3.2.4).
std::string stored(std::string_view raw) {
    std::string out = "\x78\x01";
    constexpr std::size_t most = 65535;
    for (std::size_t i = 0; i < raw.size(); i += most) {
        const std::string_view part = raw.substr(i, most);
        const auto n = static_cast<std::uint32_t>(part.size());
        out += i + most >= raw.size() ? '\1' : '\0';
        for (const std::uint32_t x : {n, ~n}) {
            out += static_cast<char>(x & 255);
            out += static_cast<char>(x >> 8 & 255);
        }
        out += part;
    }
    put32(out, adler_of(raw));
    return out;
}

std::string base64(std::string_view bytes) {
    static constexpr char letters[] = "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/";
    std::string out;
    for (std::size_t i = 0; i < bytes.size(); i += 3) {
        std::uint32_t x = 0;
        for (std::size_t k = 0; k < 3; ++k)
            x = x << 8 | (i + k < bytes.size() ? static_cast<unsigned char>(bytes[i + k]) : 0u);
        for (std::size_t k = 0; k < 4; ++k) out += i + k > bytes.size() ? '=' : letters[x >> (18 - 6 * k) & 63];
    }
    return out;
}

}  // namespace

std::string png_address(int columns, int rows, std::span<const Colour> pixels) {
    if (columns < 1 || rows < 1 || pixels.size() != static_cast<std::size_t>(columns) * static_cast<std::size_t>(rows))
        return {};
    std::string raw;
    for (int row = 0; row < rows; ++row) {
        raw += '\0';  // no row filter
        for (const Colour& c :
             pixels.subspan(static_cast<std::size_t>(row) * columns, static_cast<std::size_t>(columns))) {
            for (const std::uint8_t byte : {c.r, c.g, c.b, c.a}) raw += static_cast<char>(byte);
        }
    }
    std::string header;
    put32(header, static_cast<std::uint32_t>(columns));
    put32(header, static_cast<std::uint32_t>(rows));
    header += std::string("\x08\x06\x00\x00\x00", 5);  // 8 bits, RGBA
    std::string out = "\x89PNG\r\n\x1a\n";
    chunk(out, "IHDR", header);
    chunk(out, "IDAT", stored(raw));
    chunk(out, "IEND", {});
    return "data:image/png;base64," + base64(out);
}

}  // namespace gg
