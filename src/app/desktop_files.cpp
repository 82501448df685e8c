#include "app/desktop_files.hpp"

#include <fcntl.h>
#include <spawn.h>
#include <sys/stat.h>
#include <sys/wait.h>
#include <unistd.h>

#include <array>
#include <cerrno>
#include <csignal>
#include <cstdlib>
#include <fstream>
#include <vector>

extern char** environ;

namespace gg::platform {

namespace {

constexpr std::uintmax_t most_bytes = 1'100'000;

Path from_environment(const char* name) {
    const char* value = std::getenv(name);
    return value ? Path(value) : Path();
}

Path home() {
    const Path path = from_environment("HOME");
    return path.empty() ? Path(".") : path;
}

bool write_all(int file, const std::string& text) {
    std::size_t done = 0;
    while (done < text.size()) {
        const ssize_t n = ::write(file, text.data() + done, text.size() - done);
        if (n < 0 && errno == EINTR) continue;
        if (n <= 0) return false;
        done += static_cast<std::size_t>(n);
    }
    return ::fsync(file) == 0;
}

/// Starts a program with its standard output on `output`; its process id, or 0 when there is no such program.
pid_t spawn(std::vector<std::string> words, int output) {
    std::vector<char*> pointers;
    for (std::string& word : words) pointers.push_back(word.data());
    pointers.push_back(nullptr);
    posix_spawn_file_actions_t actions;
    posix_spawn_file_actions_init(&actions);
    posix_spawn_file_actions_adddup2(&actions, output, STDOUT_FILENO);
    pid_t child = 0;
    const int failed = ::posix_spawnp(&child, pointers[0], &actions, nullptr, pointers.data(), environ);
    posix_spawn_file_actions_destroy(&actions);
    return failed ? 0 : child;
}

}  // namespace

std::optional<std::string> read_file(const Path& path) {
    std::error_code wrong;
    if (!std::filesystem::is_regular_file(path, wrong) || std::filesystem::file_size(path, wrong) > most_bytes)
        return std::nullopt;
    std::ifstream file(path, std::ios::binary);
    std::string text((std::istreambuf_iterator<char>(file)), std::istreambuf_iterator<char>());
    if (!file) return std::nullopt;
    return text;
}

bool write_file(const Path& path, const std::string& text) {
    std::error_code wrong;
    if (path.has_parent_path()) std::filesystem::create_directories(path.parent_path(), wrong);
    std::string draft = path.string() + ".XXXXXX";
    const int file = ::mkstemp(draft.data());
    if (file < 0) return false;
    // mkstemp makes the file private; what it replaces keeps its own rights, a new one is as readable as any other.
    const auto now = std::filesystem::status(path, wrong);
    ::fchmod(file, std::filesystem::exists(now) ? static_cast<mode_t>(now.permissions()) & 0777 : 0644);
    const bool written = write_all(file, text);
    const bool closed = ::close(file) == 0;
    if (written && closed && ::rename(draft.c_str(), path.c_str()) == 0) return true;
    ::unlink(draft.c_str());
    return false;
}

Path data_folder() {
    const Path base = from_environment("XDG_DATA_HOME");
    return (base.is_absolute() ? base : home() / ".local/share") / "groundgrain";
}

Path documents_folder() {
    const Path base = from_environment("XDG_CONFIG_HOME");
    std::ifstream file((base.is_absolute() ? base : home() / ".config") / "user-dirs.dirs");
    Path found = home() / "Documents";
    for (std::string line; std::getline(file, line);) {  // XDG_DOCUMENTS_DIR="$HOME/Papers"
        constexpr std::string_view key = "XDG_DOCUMENTS_DIR=\"", here = "$HOME/";
        if (line.rfind(key, 0) != 0 || line.back() != '"') continue;
        const std::string place = line.substr(key.size(), line.size() - key.size() - 1);
        found = place.rfind(here, 0) == 0 ? home() / place.substr(here.size()) : Path(place);
    }
    std::error_code wrong;
    return std::filesystem::is_directory(found, wrong) ? found : home();
}

Path free_place(const Path& folder, const std::string& name) {
    std::string plain;
    for (const char c : name) plain += c == '/' || static_cast<unsigned char>(c) < ' ' ? '-' : c;
    Path place = folder / plain;
    std::error_code wrong;
    for (int n = 2; std::filesystem::exists(place, wrong); ++n)
        place = folder / (Path(plain).stem().string() + "-" + std::to_string(n) + Path(plain).extension().string());
    return place;
}

Dialog::~Dialog() {
    if (pipe_ >= 0) ::close(pipe_);
    if (child_ > 0) {
        ::kill(child_, SIGTERM);
        ::waitpid(child_, nullptr, 0);
    }
}

bool Dialog::start(Kind kind, const Path& place) {
    if (open()) return true;
    std::array<int, 2> ends{};
    if (::pipe2(ends.data(), O_CLOEXEC) != 0) return false;
    const bool save = kind == Kind::save;
    std::vector<std::string> zenity{"zenity", "--file-selection", "--filename=" + place.string(),
                                    "--file-filter=*.json *.svg", "--file-filter=*"};
    if (save) zenity.insert(zenity.end(), {"--save", "--confirm-overwrite"});
    child_ = spawn(std::move(zenity), ends[1]);
    if (!child_) child_ = spawn({"kdialog", save ? "--getsavefilename" : "--getopenfilename", place.string()}, ends[1]);
    ::close(ends[1]);
    if (!child_) {
        ::close(ends[0]);
        return false;
    }
    ::fcntl(ends[0], F_SETFL, O_NONBLOCK);
    pipe_ = ends[0];
    said_.clear();
    return true;
}

std::optional<Path> Dialog::finished() {
    if (!open()) return std::nullopt;
    std::array<char, 4096> block;
    ssize_t n = 0;
    while ((n = ::read(pipe_, block.data(), block.size())) > 0) said_.append(block.data(), static_cast<std::size_t>(n));
    if (n < 0) return std::nullopt;  // open, and nothing said yet
    ::waitpid(child_, nullptr, 0);
    ::close(pipe_);
    child_ = 0;
    pipe_ = -1;
    while (!said_.empty() && said_.back() == '\n') said_.pop_back();
    return Path(said_);
}

}  // namespace gg::platform
