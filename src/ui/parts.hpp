#pragma once
/// The parts of the screen, one source each. Each draws itself into a box and acts on the session.
#include <string>

#include "ui/screen.hpp"

namespace gg {

/// The picture and what is held on it.
struct Grip {
    std::string field;  ///< of the handle under the pointer's press; empty: none
    Handle handle;      ///< as it was when the press began
    Point from;
    Figure figure;             ///< what was drawn last
    double hint_since = -1.0;  ///< s, when the hint began to fade
};
/// The handle nearest to `p` within reach of a finger (or a mouse); null: none.
const Handle* handle_near(const Figure& figure, Point p, bool touch);

void header_ui(Screen& screen);
void tabs_ui(Screen& screen);
void strip_ui(Screen& screen);
void picture_ui(Screen& screen, Grip& grip, Point pointer);
/// Gain, field, layers, raw or focused: how Pair's section is looked at.
void section_switches_ui(Screen& screen, Box row);
/// The inputs that the view depends on most (phone, tablet).
void view_inputs_ui(Screen& screen);
/// Every input of a group ("ground", "target", ...), or of all groups when `group` is empty; gives the y below.
double all_inputs_ui(Screen& screen, const std::string& group, double x, double y, double width);
/// The desktop's columns.
void input_column_ui(Screen& screen);
void answer_column_ui(Screen& screen);
void footer_ui(Screen& screen);

/// One number: label, less, value, more. One row high, or more where a fault stands below; gives the y below.
double number_row(Screen& screen, const std::string& key, double x, double y, double width);
double choice_row(Screen& screen, const Choice& choice, double x, double y, double width);
/// A row that leads on: label left, words right.
bool lead_row(Screen& screen, const std::string& id, std::string_view label, std::string_view words, Box box);

/// Draws the sheet over everything.
void sheet_ui(Screen& screen, const Sheet& sheet);
/// Title, close button and a hairline; gives the box that is left for the content.
Box sheet_frame(Screen& screen, std::string_view title, double wanted_height, bool narrow = false);
void card_ui(Screen& screen, const std::string& key);
void keypad_ui(Screen& screen);
void list_ui(Screen& screen, const std::string& key);
void menu_ui(Screen& screen);
void demos_ui(Screen& screen);
void rename_ui(Screen& screen);
void about_ui(Screen& screen);

/// "0.31 m", or a dash with the reason where there is no number.
std::string likely_words(const Answer& answer, UnitSystem units);
/// A text field where the person types on a real keyboard; true when it was left by Enter or by going elsewhere.
bool typing_field(Screen& screen, const char* id, std::string& text, Box box, bool number, bool begin);

}  // namespace gg
