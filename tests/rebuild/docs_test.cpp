// The routes as docs/formats.md lists them: made from the registry, so that page and code can't drift apart.
#include <fstream>
#include <iterator>

#include "help.hpp"

TEST_CASE("docs/formats.md lists the routes of the registry") {
  std::string section = "## Routes\n";
  for (const auto& route : steelyard::routes()) {
    section.append("\n### `").append(route.id).append("`\n\nNeeds ").append(route.needs).append(". ");
    section.append(route.formula).append(". Source: ").append(route.source).append(".\n\n```csv\n");
    section.append(route.example).append("\n```\n");
  }
  std::ifstream file(STEELYARD_TEST_DIR "/../docs/formats.md");
  const std::string page((std::istreambuf_iterator<char>(file)), std::istreambuf_iterator<char>());
  INFO("docs/formats.md should carry this section:\n" << section);
  CHECK(page.find(section) != std::string::npos);
}
