// Private to the room: the shape of each document.
#pragma once

#include "render/json/fields.hpp"

namespace steelyard::json {

[[nodiscard]] const Shape& pool_shape();
[[nodiscard]] const Shape& check_shape();
[[nodiscard]] const Shape& weigh_shape();
[[nodiscard]] const Shape& stress_shape();
[[nodiscard]] const Shape& replicate_shape();

/// The schema and the fields of a file of studies, from the table of columns.
[[nodiscard]] std::string studies_schema(std::string_view title, std::string_view id);
[[nodiscard]] std::string studies_fields();

}  // namespace steelyard::json
