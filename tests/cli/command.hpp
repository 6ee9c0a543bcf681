// Runs the command as a user does, in a folder of its own.
#pragma once

#include <map>
#include <string>
#include <vector>

namespace steelyard::test {

struct Ran {
  int status = -1;  ///< exit status; 128 + number when a signal ended it
  std::string out;
  std::string err;
};

struct Setting {
  std::string input;                               ///< for standard input
  std::map<std::string, std::string> environment;  ///< on top of an empty one with PATH only
};

/// A temporary folder that goes away with its files.
class Folder {
 public:
  Folder();
  ~Folder();
  Folder(const Folder&) = delete;
  Folder& operator=(const Folder&) = delete;

  [[nodiscard]] std::string path(const std::string& name) const { return path_ + "/" + name; }
  /// Writes a file and gives its path.
  std::string file(const std::string& name, const std::string& bytes) const;
  [[nodiscard]] std::string read(const std::string& name) const;
  /// Names of all entries, sorted.
  [[nodiscard]] std::vector<std::string> names() const;

 private:
  std::string path_;
};

/// Runs `steelyard` with these arguments.
[[nodiscard]] Ran run_command(const std::vector<std::string>& arguments, const Setting& setting = {});
/// Runs a line of sh in which $STEELYARD is the command.
[[nodiscard]] Ran shell(const std::string& line, const Setting& setting = {});

/// The bytes of a file.
[[nodiscard]] std::string bytes_of(const std::string& path);

/// A data set of the project.
[[nodiscard]] std::string dataset(const std::string& name);

}  // namespace steelyard::test
