#include <algorithm>
#include <cmath>
#include <set>

#include "draw/units.hpp"
#include "paper/json.hpp"
#include "paper/plan_file.hpp"

namespace gg {

namespace {

constexpr std::size_t most_bytes = 1'000'000;
constexpr int deepest_nesting = 16;
constexpr std::size_t most_notes = 20;
constexpr std::size_t most_corners = 200;

std::string shown(const Json& value) {
    if (value.is_array()) return "a list";
    if (value.is_object()) return "a group of keys";
    std::string text = value.dump(-1, ' ', false, Json::error_handler_t::replace);
    if (text.size() > 40) text = text.substr(0, 40) + "...";
    return text;
}

std::string in_quotes(std::string_view words) {
    std::string text(1, '"');
    text += words;
    return text += '"';
}

std::string digits(double x) { return Json(x).dump(); }

class Reader {
  public:
    explicit Reader(std::string_view text) : text_(text) {}

    ReadPlan read() {
        if (parse() && schema()) {
            names();
            if (ground()) {
                choices();
                numbers();
                outline();
                strangers();
            }
        }
        return std::move(result_);
    }

  private:
    void fault(std::string sentence) { result_.faults.push_back(std::move(sentence)); }
    void note(std::string sentence) {
        if (result_.notes.size() < most_notes) result_.notes.push_back(std::move(sentence));
    }

    bool parse() {
        if (text_.size() > most_bytes) {
            fault("This file is larger than 1 MB; a plan is a few kB.");
            return false;
        }
        bool too_deep = false;
        const auto watch = [&](int depth, Json::parse_event_t, Json&) {
            too_deep = too_deep || depth > deepest_nesting;
            return depth <= deepest_nesting;
        };
        root_ = Json::parse(text_.begin(), text_.end(), watch, false);
        if (too_deep)
            fault("This file nests deeper than any plan does.");
        else if (root_.is_discarded())
            fault("This file is not JSON.");
        else if (!root_.is_object())
            fault("This file is JSON, but not a plan: a plan is a group of keys in { }.");
        return result_.faults.empty();
    }

    /// One schema so far, so there is nothing to migrate.
    bool schema() {
        if (!root_.contains("schema")) {
            note("schema is missing: 1 is taken.");
            return true;
        }
        const Json& found = root_["schema"];
        if (!found.is_number_integer() || found < 1)
            fault("schema is " + shown(found) + "; it must be a whole number from 1 up.");
        else if (found > plan_schema)
            fault("This plan was written by a newer Groundgrain (schema " + shown(found) + "; this one reads up to " +
                  std::to_string(plan_schema) + "). It was left as it is: open it with the newer one.");
        return result_.faults.empty();
    }

    void words(const char* key, std::string& into) {
        known_.insert(key);
        if (!root_.contains(key)) return;
        if (root_[key].is_string())
            into = root_[key].get<std::string>();
        else
            fault(std::string(key) + " is " + shown(root_[key]) + "; it must be text in quotes.");
    }

    void names() {
        known_.insert("schema");
        words("name", plan().name);
        words("note", plan().note);
        if (!root_.contains("name")) note("name is missing: " + in_quotes(plan().name) + " is taken.");
        for (const char* section : {"target", "antenna", "pass", "lanes", "need"}) {
            known_.insert(section);
            if (!root_.contains(section))
                note(std::string(section) + " is missing: its usual values are taken.");
            else if (!root_[section].is_object())
                fault(std::string(section) + " is " + shown(root_[section]) + "; it must be a group of keys in { }.");
        }
    }

    bool ground() {
        known_.insert("ground");
        const std::string wanted = "a list of 1 to " + std::to_string(most_layers) +
                                   " layers from the top, such as [{\"material\": \"wet-clay\"}]";
        if (!root_.contains("ground")) {
            fault("ground is missing: it must be " + wanted + ".");
            return false;
        }
        const Json& layers = root_["ground"];
        if (!layers.is_array() || layers.empty() || layers.size() > static_cast<std::size_t>(most_layers)) {
            const bool list = layers.is_array();
            fault("ground is " + (list ? "a list of " + std::to_string(layers.size()) : shown(layers)) +
                  "; it must be " + wanted + ".");
            return false;
        }
        for (std::size_t i = 0; i < layers.size(); ++i) {
            known_.insert("ground." + std::to_string(i));
            if (!layers[i].is_object())
                fault("ground." + std::to_string(i) + " is " + shown(layers[i]) +
                      "; a layer is a group of keys in { }.");
        }
        plan().ground.assign(layers.size(), Layer{matter_of("own"), Layer{}.thickness});
        return result_.faults.empty();
    }

    /// The value at a dotted key, or null where it is missing.
    const Json* at(const std::string& dotted) {
        known_.insert(dotted);
        const auto pointer = pointer_to(dotted);
        return root_.contains(pointer) ? &root_[pointer] : nullptr;
    }
    void missing(const std::string& dotted, const std::string& taken) {
        if (root_.contains(dotted.substr(0, dotted.find('.')))) note(dotted + " is missing: " + taken + " is taken.");
    }

    void choices() {
        // A choice may bring up another one behind it, so the list is asked for again each time.
        for (std::size_t i = 0; i < choices_of(plan()).size(); ++i) {
            const std::string key = choices_of(plan())[i].key;
            const Json* found = at(key);
            if (!found)
                missing(key, in_quotes(choice_at(plan(), key).value_or("")));
            else if (!found->is_string())
                fault(key + " is " + shown(*found) + "; it must be a name in quotes.");
            else if (std::string wrong = set_choice(plan(), key, found->get<std::string>()); !wrong.empty())
                fault(key + ": " + wrong);
        }
        known_.insert("target.own");
    }

    /// Whether `value` is a number that `field` may hold; a fault if not.
    bool number(const Field& field, const std::string& key, const Json& value) {
        const bool angle = field.quantity == Quantity::angle;
        const std::string unit(angle ? "degrees" : si_unit(field.quantity));
        const std::string in_unit = unit.empty() ? "" : " (" + unit + ")";
        const bool whole = field.quantity == Quantity::count;
        if (!value.is_number()) {
            fault(key + " is " + shown(value) + "; it must be a " + (whole ? "whole " : "") + "number" + in_unit +
                  (field.is_range ? ", or [low, likely, high]." : "."));
            return false;
        }
        const double x = value.get<double>();
        if (angle ? std::abs(x) <= 1e6 : x >= field.low && x <= field.high && (!whole || x == std::floor(x)))
            return true;
        fault(key + " is " + shown(value) + "; it must be " + (whole ? "a whole number " : "") + "from " +
              digits(angle ? -360.0 : field.low) + " to " + digits(angle ? 360.0 : field.high) + in_unit + ".");
        return false;
    }

    void set(const std::string& key, double x) {
        if (const std::string wrong = set_number(plan(), key, x); !wrong.empty())
            fault(key + ": " + spell(wrong, UnitSystem::metric));
    }

    void numbers() {
        for (const Field& field : fields_of(plan())) {
            if (field.derived) continue;
            const std::string key = dotted_in_file(field);
            const Json* found = at(key);
            if (!found) {
                // A layer's inputs have their catalogue's ranges: leaving them out is how most layers are written.
                const bool input = field.is_range && !key.ends_with(".thickness") && key != "target.depth";
                const double usual = number_at(plan(), field.key).value_or(0.0);
                if (!input) missing(key, digits(field.quantity == Quantity::angle ? usual * (180 / pi) : usual));
                continue;
            }
            if (!field.is_range || !found->is_array()) {
                if (!number(field, key, *found)) continue;
                const double x = found->get<double>();
                set(field.key, field.quantity == Quantity::angle ? x * (pi / 180) : x);
                if (field.is_range) set_ends(field.key, x, x);
                continue;
            }
            if (found->size() != 3) {
                fault(key + " is a list of " + std::to_string(found->size()) +
                      "; a range has three numbers, [low, likely, high].");
                continue;
            }
            const Json &low = (*found)[0], &likely = (*found)[1], &high = (*found)[2];
            if (!number(field, key, low) || !number(field, key, likely) || !number(field, key, high)) continue;
            if (low > likely || likely > high) {
                fault(key + " is out of order: a range is [low, likely, high], from small to large.");
                continue;
            }
            set(field.key, likely.get<double>());
            set_ends(field.key, low.get<double>(), high.get<double>());
        }
    }
    void set_ends(const std::string& key, double low, double high) {
        set(key + ".low", low);
        set(key + ".high", high);
    }

    void outline() {
        const Json* found = at("lanes.outline");
        if (!found) return missing("lanes.outline", "a rectangle of 20 m by 15 m");
        const std::string wanted = "; it must be a list of 3 to " + std::to_string(most_corners) +
                                   " corners [east, north] in m, in walking order.";
        if (!found->is_array() || found->size() < 3 || found->size() > most_corners)
            return fault("lanes.outline is " + shown(*found) + wanted);
        std::vector<SitePoint> corners;
        for (const Json& corner : *found) {
            const bool pair = corner.is_array() && corner.size() == 2 && corner[0].is_number() && corner[1].is_number();
            const SitePoint p = pair ? SitePoint{corner[0].get<double>(), corner[1].get<double>()} : SitePoint{};
            if (!pair || std::abs(p.x) > 1e7 || std::abs(p.y) > 1e7)
                return fault("lanes.outline has a corner that is " + shown(corner) + wanted);
            corners.push_back(p);
        }
        plan().lanes.outline = std::move(corners);
        plan() = at_rest(std::move(plan()));
    }

    /// Notes on keys that no plan has.
    void strangers() { walk(root_, ""); }
    void walk(const Json& group, const std::string& prefix) {
        for (const auto& [name, value] : group.items()) {
            const std::string key = prefix + name;
            if (!known_.count(key))
                note(in_quotes(key.substr(0, 60)) + " is no key that this plan uses: it is passed over.");
            else if (value.is_object() || (key == "ground" && value.is_array()))
                walk(value, key + ".");
        }
    }

    Plan& plan() { return result_.plan; }

    std::string_view text_;
    Json root_;
    ReadPlan result_;
    std::set<std::string> known_;
};

}  // namespace

ReadPlan read_plan(std::string_view json) { return Reader(json).read(); }

}  // namespace gg
