// Errors put into honest rows on purpose, and how far they move what follows from the row.
#pragma once

#include <optional>
#include <string>

#include "simulate.hpp"

namespace seed {

enum class Error { transposed_digits, wrong_df, halved_p, flipped_sign, se_for_sd };
[[nodiscard]] const char* name(Error error);

/// The row with one such error; nothing where the row has no place for it.
[[nodiscard]] std::optional<simulate::Row> with_error(const simulate::Row& row, Error error,
                                                      simulate::Random& random);

/// Largest distance, over the row's relations (p of t, t of means, d of means or t, t of the interval, r of
/// t), between what is recomputed from rounded inputs and what is printed, in units of both rounding bands
/// together. Above 1: the error moves the recomputed value outside its rounding band by more than its width.
[[nodiscard]] double distance(const simulate::Row& row);

}  // namespace seed
