#pragma once
/// One sitting: the plan under way, what it answers, what is on the screen, and the acts that change them.
#include <optional>
#include <string>
#include <vector>

#include "draw/figure.hpp"
#include "survey/answers.hpp"
#include "ui/history.hpp"
#include "ui/preferences.hpp"
#include "ui/program.hpp"

namespace gg {

/// Something laid over the main screen; `key` says about what.
struct Sheet {
    enum class Kind : std::uint8_t { card, keypad, list, menu, demos, inputs, rename, about };
    Kind kind = Kind::menu;
    std::string key;
    bool operator==(const Sheet&) const = default;
};

/// A number that is being typed. `fault` stands beside it when it could not be taken; the text stays as typed.
struct Edit {
    std::string key;
    std::string text;
    std::string fault;
    bool fresh = false;  ///< the first key typed replaces the text
    bool begun = false;  ///< its text field has the keyboard or had it
    bool operator==(const Edit&) const = default;
};

struct ViewState {
    View view = View::beam;
    std::vector<Sheet> sheets;  ///< the last one is on top
    Edit edit;
    std::string focus;          ///< id of the control that keys act on
    bool formula_open = false;  ///< in the answer card
    SectionLook look{};         ///< at Pair's section, and which way its antenna is turned
    Polarisation field = Polarisation::along;
    bool operator==(const ViewState&) const = default;
};

struct Session {
    Plan plan;
    Answers answers;    ///< of `plan`, or of the last plan that made sense
    std::string stale;  ///< why the answers are not of this plan; empty when they are
    ViewState view;
    Preferences preferences;
    History history;
    std::vector<Request> requests;
    std::string notice;  ///< a passing word at the bottom of the screen
    double notice_until = 0.0;
    double now = 0.0;
    bool gesture = false;                  ///< a drag or a held button is changing the plan
    const PairSection* section = nullptr;  ///< while Pair is open, the newest there is; null: `no_section` says why
    std::string no_section;
    bool computing = false;  ///< a newer section, or more of it, is on its way

    Session();
    /// Brings the answers up to the plan; does nothing where they are.
    void refresh();

    // ---- acts; each returns the sentence that says why not, or nothing ----
    std::string set(std::string_view key, double value);
    std::string choose(std::string_view key, std::string_view option);
    std::string add_layer(int above);
    std::string remove_layer(int index);
    /// A whole act of its own: kept for undo at once.
    void act(const std::string& fault);
    void open(Plan next, std::string words);
    std::string open_text(std::string_view json, std::string_view name);
    void undo();
    void redo();
    void say_notice(std::string words);

    // ---- sheets and typing ----
    void show(Sheet::Kind kind, std::string key = {});
    void close();  ///< the top sheet
    void begin_edit(std::string_view key);
    /// Takes what was typed; true when the plan has it.
    bool commit_edit();

    UnitSystem units() const { return preferences.units; }
    /// A text of the answers with its numbers in the reader's units.
    std::string words(std::string_view text) const { return spell(text, preferences.units); }

  private:
    std::optional<Plan> answered_;  // the plan last looked at by refresh()
};

/// What stands in a field while it is not being typed in: "0.90 m", "400 MHz"; without its unit when `bare`.
std::string shown_number(double si, Quantity quantity, UnitSystem units, bool bare = false);

}  // namespace gg
