// A line on standard error while something takes longer than a second.
#pragma once

#include <memory>
#include <string>

namespace steelyard::cli {

/// Shows `what` and the seconds so far, from the first second on and only on a terminal; takes the
/// line away when it ends.
class Progress {
 public:
  explicit Progress(std::string what);
  ~Progress();
  Progress(const Progress&) = delete;
  Progress& operator=(const Progress&) = delete;

 private:
  struct Watch;
  std::unique_ptr<Watch> watch_;  ///< null when standard error is no terminal
};

}  // namespace steelyard::cli
