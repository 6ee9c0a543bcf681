// The rules as docs/audit.md lists them.
#include <catch2/catch.hpp>
#include <fstream>
#include <iterator>
#include <string>

#include "steelyard/audit.hpp"

TEST_CASE("docs/audit.md lists the rules of the registry") {
  std::string table = "| rule | holds when | source |\n|---|---|---|\n";
  for (const auto& rule : steelyard::audit_rules()) {
    table.append("| `")
        .append(rule.id)
        .append("` | ")
        .append(rule.checks)
        .append(" | ")
        .append(rule.source)
        .append(" |\n");
  }
  std::ifstream file(STEELYARD_TEST_DIR "/../docs/audit.md");
  const std::string page((std::istreambuf_iterator<char>(file)), std::istreambuf_iterator<char>());
  INFO("docs/audit.md should carry this table:\n" << table);
  CHECK(page.find(table) != std::string::npos);
}
