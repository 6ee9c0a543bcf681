// Pages of docs/ that are made from the tables; a test holds the files against them.
#pragma once

#include <string>
#include <vector>

namespace steelyard::cli {

struct Page {
  std::string path;  ///< below docs/
  std::string text;
};

/// docs/cli.md, docs/json.md and the schemas.
[[nodiscard]] std::vector<Page> reference_pages();

}  // namespace steelyard::cli
