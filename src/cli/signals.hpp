// Unfinished files, so that an interruption can remove them.
#pragma once

#include <string>

namespace steelyard::cli {

/// Remembers the name of an unfinished file, to be removed when a signal ends the process. False
/// when too many are remembered already or the name is too long.
bool remember_unfinished(const std::string& name);
void forget_unfinished(const std::string& name);

}  // namespace steelyard::cli
