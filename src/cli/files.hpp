// Reading whole files; writing files that are either whole or not there.
#pragma once

#include <optional>
#include <string>
#include <string_view>

namespace steelyard::cli {

/// The bytes of a file ("-": standard input), or a sentence that says why not.
struct FileText {
  std::string text;
  std::string problem;
};
[[nodiscard]] FileText read_file(const std::string& name);

/// A file that is being written: into a new file beside the target, which takes the target's place
/// when all is written. Until then the old file stays as it is, and when anything goes wrong, an
/// interruption included, the new one is removed. Devices and pipes are written straight.
class OutputFile {
 public:
  /// Opens the target ("-": standard output; "": nothing is written).
  explicit OutputFile(const std::string& name);
  ~OutputFile();
  OutputFile(const OutputFile&) = delete;
  OutputFile& operator=(const OutputFile&) = delete;

  /// Why it could not be opened or written; "" when all is well.
  [[nodiscard]] const std::string& problem() const { return problem_; }
  [[nodiscard]] bool wanted() const { return !name_.empty(); }

  void write(std::string_view bytes);
  /// Puts the new file in the target's place.
  void commit();

 private:
  void fail(const char* action, int error);
  void open_beside();

  std::string name_;
  std::string target_;     ///< name_ with symbolic links followed
  std::string temporary_;  ///< "" when the target is written straight
  int descriptor_ = -1;
  std::string problem_;
};

/// Writes text to standard output; gives "" or what went wrong. A reader that has closed the pipe is no
/// failure: it has seen what it wanted.
[[nodiscard]] std::string write_standard_output(std::string_view text);

/// Whether both names lead to the same existing file.
[[nodiscard]] bool same_file(const std::string& a, const std::string& b);

/// From now on an interruption (Ctrl-C, hang-up, termination) removes the unfinished files first, and
/// a closed pipe is reported by write() instead of ending the process.
void watch_signals();

}  // namespace steelyard::cli
