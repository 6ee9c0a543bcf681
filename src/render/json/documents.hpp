// Private to the room: the shape of each document.
#pragma once

#include "render/json/fields.hpp"

namespace steelyard::json {

[[nodiscard]] const Shape& pool_shape();
[[nodiscard]] const Shape& check_shape();
[[nodiscard]] const Shape& studies_shape();  ///< the form of input

}  // namespace steelyard::json
