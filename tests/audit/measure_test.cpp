// What the audit finds in 10,000 honest rows, and of seeded errors: the table of docs/audit.md.
#include <fmt/format.h>

#include <algorithm>
#include <catch2/catch.hpp>
#include <fstream>
#include <iterator>
#include <string>
#include <vector>

#include "seed.hpp"
#include "simulate.hpp"
#include "steelyard/audit.hpp"

using steelyard::Finding;
using steelyard::Grade;

namespace {

constexpr std::size_t honest_rows = 10000;
constexpr std::size_t seeded_rows = 4000;  // tried for each kind of error

std::vector<Finding> findings(const simulate::Row& row) {
  const auto read = steelyard::read_csv(simulate::csv(row), "rows.csv");
  for (const auto& d : read.diagnostics) UNSCOPED_INFO(steelyard::to_text(d));
  INFO(simulate::csv(row));
  REQUIRE(read.ok());
  return steelyard::audit(*read.value, {});
}

struct Count {
  std::size_t rows = 0, look = 0, verdict = 0, impossible = 0;

  void add(const std::vector<Finding>& all) {
    ++rows;
    Grade worst = Grade::worth_a_look;
    for (const Finding& f : all) worst = std::max(worst, f.grade);
    if (all.empty()) return;
    ++(worst == Grade::impossible ? impossible : worst == Grade::changes_the_verdict ? verdict : look);
  }
  [[nodiscard]] std::size_t found() const { return look + verdict + impossible; }
};

// The errors' own findings: what a sound row says already doesn't count.
std::vector<Finding> added(const std::vector<Finding>& after, const std::vector<Finding>& before) {
  std::vector<Finding> result;
  std::copy_if(after.begin(), after.end(), std::back_inserter(result), [&](const Finding& f) {
    return std::none_of(before.begin(), before.end(), [&](const Finding& g) { return g.rule == f.rule; });
  });
  return result;
}

std::vector<Count> honest() {
  simulate::Random random(20240501);
  std::vector<Count> counts(simulate::forms());
  for (std::size_t i = 0; i < honest_rows; ++i) {
    const std::size_t form = i % simulate::forms();
    const auto row = simulate::honest_row(form, random, false);
    const auto all = findings(row);
    counts[form].add(all);
    for (const Finding& f : all) {
      INFO(row.form << "\n" << simulate::csv(row) << f.rule << ": " << f.what);
      CHECK(f.grade == Grade::worth_a_look);
    }
  }
  return counts;
}

Count seeded(seed::Error error) {
  simulate::Random random(20240502);
  Count count;
  for (std::size_t i = 0; i < seeded_rows; ++i) {
    const auto row = simulate::honest_row(i % simulate::forms(), random, true);
    const auto wrong = seed::with_error(row, error, random);
    if (!wrong || seed::distance(row) > 0.0 || seed::distance(*wrong) <= 1.0) continue;
    count.add(added(findings(*wrong), findings(row)));
  }
  return count;
}

std::string form_name(std::size_t form) {
  simulate::Random random(1);
  return simulate::honest_row(form, random, true).form;
}

}  // namespace

TEST_CASE("the audit is measured, and docs/audit.md says so") {
  std::string table =
      "| honest rows | rows | worth a look | changes the verdict | impossible |\n|---|--:|--:|--:|--:|\n";
  Count all;
  const std::vector<Count> counts = honest();
  for (std::size_t form = 0; form < counts.size(); ++form) {
    const Count& c = counts[form];
    table +=
        fmt::format("| {} | {} | {} | {} | {} |\n", form_name(form), c.rows, c.look, c.verdict, c.impossible);
    all = {all.rows + c.rows, all.look + c.look, all.verdict + c.verdict, all.impossible + c.impossible};
  }
  table += fmt::format("| **all** | {} | {} | {} | {} |\n", all.rows, all.look, all.verdict, all.impossible);
  table +=
      "\n| seeded error | rows moved | found | worth a look | changes the verdict | impossible "
      "|\n|---|--:|--:|--:|--:|--:|\n";
  for (const auto error : {seed::Error::transposed_digits, seed::Error::wrong_df, seed::Error::halved_p,
                           seed::Error::flipped_sign, seed::Error::se_for_sd}) {
    const Count c = seeded(error);
    INFO(seed::name(error));
    CHECK(c.rows >= 100);
    CHECK(c.found() * 10 >= c.rows * 9);
    table += fmt::format("| {} | {} | {:.1f} % | {} | {} | {} |\n", seed::name(error), c.rows,
                         100.0 * static_cast<double>(c.found()) / static_cast<double>(c.rows), c.look,
                         c.verdict, c.impossible);
  }
  std::ifstream file(STEELYARD_TEST_DIR "/../docs/audit.md");
  const std::string page((std::istreambuf_iterator<char>(file)), std::istreambuf_iterator<char>());
  INFO("docs/audit.md should carry this table:\n" << table);
  CHECK(page.find(table) != std::string::npos);
}
