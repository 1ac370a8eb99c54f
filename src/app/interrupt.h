#pragma once
// Ctrl-C and termination: the first asks long work to stop and tidy up, the second stops at once.

namespace sunfall {

void watch_for_interrupts();
bool interrupted();

}  // namespace sunfall
