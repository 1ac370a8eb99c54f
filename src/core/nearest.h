#pragma once
// "Did you mean": the nearest of the known names.

#include <string>
#include <vector>

namespace sunfall {

// The known name with the smallest edit distance (insert, delete, replace, swap of neighbours; case
// is ignored), or an empty string where even that one differs in more than half its letters.
std::string nearest_name(const std::string& name, const std::vector<std::string>& known);

}  // namespace sunfall
