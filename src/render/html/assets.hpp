// The style sheet and the script of the report, as they stand in the file.
#pragma once

#include <string>
#include <string_view>

namespace steelyard::render::html {

[[nodiscard]] std::string style();
[[nodiscard]] std::string_view script();

/// `sha256-...` of a text, as a Content-Security-Policy names what may run.
[[nodiscard]] std::string policy_hash(std::string_view text);

}  // namespace steelyard::render::html
