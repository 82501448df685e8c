#pragma once
/// Files of the desktop window: where they lie, how they are written, and the desktop's own file dialog.
#include <sys/types.h>

#include <filesystem>
#include <optional>
#include <string>

namespace gg::platform {

using Path = std::filesystem::path;

/// Nothing when it cannot be read, or is larger than any plan (1 MB and a little).
std::optional<std::string> read_file(const Path& path);
/// Whole or not at all: a new file beside it takes its place once it is on the disk. Missing folders are made.
bool write_file(const Path& path, const std::string& text);

/// Where this program keeps what it remembers (XDG base directories), and where the person keeps documents.
Path data_folder();
Path documents_folder();
/// `name` in `folder`, with a number added where that is taken: nothing is ever written over unasked.
Path free_place(const Path& folder, const std::string& name);

/// A file dialog of the desktop (zenity or kdialog), run beside the window so that it goes on drawing.
class Dialog {
  public:
    enum class Kind : unsigned char { open, save };
    Dialog() = default;
    Dialog(const Dialog&) = delete;
    Dialog& operator=(const Dialog&) = delete;
    ~Dialog();
    /// False when the desktop has neither.  @param place  folder or file to begin at
    bool start(Kind kind, const Path& place);
    bool open() const { return child_ > 0; }
    /// The file chosen, once it is: an empty path when the person thought better of it; nothing while it is open.
    std::optional<Path> finished();

  private:
    pid_t child_ = 0;
    int pipe_ = -1;
    std::string said_;
};

}  // namespace gg::platform
