#include "steelyard/read.hpp"

namespace steelyard {

Outcome<std::vector<NamedCell>> read_as_printed(std::string_view, const NumberStyle&, const Place&) {
  return {std::vector<NamedCell>{}, {}};
}

}  // namespace steelyard
