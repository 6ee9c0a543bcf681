// What the exit status of the command means (docs/cli.md).
#pragma once

namespace steelyard::cli {

enum class Exit {
  done = 0,
  unusable_data = 1,  ///< the data can't be used
  wrong_usage = 2,    ///< the command line is wrong
  file_trouble = 3,   ///< a file can't be read or written
  not_satisfied = 4,  ///< computed, but the accuracy was not reached or --fail-on was hit
};

}  // namespace steelyard::cli
