#pragma once
/// The keyboard: what is focused, what the arrows nudge, and the keys that act.
#include <deque>
#include <string>
#include <vector>

#include "ui/marks.hpp"
#include "ui/scroll.hpp"
#include "ui/session.hpp"

namespace gg {

/// Acts on the keys that went down in this frame; call between ImGui's NewFrame() and drawing.
/// @param marks  what stands on the screen, of the frame before: the focus goes from one to the next
/// @param presses  gets the id of a control that was acted on
void act_on_keys(Session& session, Scrolls& scrolls, const std::vector<Mark>& marks, std::deque<std::string>& presses);

}  // namespace gg
