// Steps that all commands share.
#pragma once

#include <functional>
#include <memory>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "exit_codes.hpp"
#include "files.hpp"
#include "options.hpp"

namespace steelyard::cli {

/// The output files of a run. All are opened before the work begins, and put in place together when
/// all of them are written.
class Outputs {
 public:
  /// Opens the files; says what is wrong with them.
  Outputs(std::span<const std::string> names, const std::string& input);
  [[nodiscard]] bool ok() const { return ok_; }
  [[nodiscard]] OutputFile& at(std::size_t index) { return *files_[index]; }
  /// True when one of them is standard output, which then carries nothing else.
  [[nodiscard]] bool takes_standard_output() const { return standard_output_; }
  /// Puts the files in place; says what went wrong.
  bool commit();

 private:
  std::vector<std::unique_ptr<OutputFile>> files_;
  bool ok_ = true;
  bool standard_output_ = false;
};

/// Text of the file that the options name; says why not.
[[nodiscard]] std::optional<std::string> input_text(const Options& options);

/// The rows that a command works on, from the file or from options that name columns; or how the run
/// ends without them, after the messages.
struct RowsOrExit {
  std::optional<Gathered> rows;
  Exit exit = Exit::done;
};
[[nodiscard]] RowsOrExit gathered_rows(const Options& options);

/// The end of a run: files in place, text printed, and what the exit status has to say.
[[nodiscard]] Exit finish(Outputs& outputs, const Options& options, const std::function<std::string()>& text,
                          bool accurate, std::span<const Finding> findings);

/// Prints results; Exit::file_trouble, with a message, when that can't be.
[[nodiscard]] Exit print(std::string_view text);

/// Whether the audit found something as bad as --fail-on says.
[[nodiscard]] bool fails_on(const Options& options, std::span<const Finding> findings);

}  // namespace steelyard::cli
