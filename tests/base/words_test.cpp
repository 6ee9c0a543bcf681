#include <catch2/catch.hpp>

#include <array>
#include <random>
#include <string>
#include <string_view>

#include "steelyard/base.hpp"

using namespace steelyard;

TEST_CASE("edit distance counts slips of the keyboard") {
  struct Case {
    const char* a;
    const char* b;
    std::size_t distance;
  };
  const Case cases[] = {
      {"", "", 0},         {"", "abc", 3},       {"abc", "", 3},          {"mean1", "mean1", 0},
      {"mean", "maen", 1}, {"study", "stdy", 1}, {"study", "sturdy", 1},  {"role", "rule", 1},
      {"ab", "ba", 1},     {"abc", "ca", 3},     {"kitten", "sitting", 3}};
  for (const Case& c : cases) {
    INFO(c.a << " / " << c.b);
    CHECK(edit_distance(c.a, c.b) == c.distance);
  }
}

TEST_CASE("edit distance is symmetric and obeys its bounds") {
  std::mt19937 random(1);
  const auto word = [&] {
    std::string text(random() % 8, 'a');
    for (char& c : text) c = static_cast<char>('a' + random() % 3);
    return text;
  };
  for (int i = 0; i < 2000; ++i) {
    const std::string a = word();
    const std::string b = word();
    INFO(a << " / " << b);
    const std::size_t distance = edit_distance(a, b);
    CHECK(distance == edit_distance(b, a));
    CHECK((distance == 0) == (a == b));
    CHECK(distance <= std::max(a.size(), b.size()));
    CHECK(distance >= std::max(a.size(), b.size()) - std::min(a.size(), b.size()));
  }
}

TEST_CASE("a column name that is probably a slip is recognized") {
  struct Case {
    const char* written;
    const char* meant;  // "" : a label of the user's own
  };
  const Case cases[] = {// case, blanks, joining marks
                        {"N1", "n1"},
                        {"Mean 1", "mean1"},
                        {"mean_1", "mean1"},
                        {"MEAN-1", "mean1"},
                        {"T", "t"},
                        {"SD1", "sd1"},
                        {"ci low", "ci_low"},
                        {"As Printed", "as_printed"},
                        {"Study", "study"},
                        {"p.", "p"},
                        // one edit, or a swapped pair
                        {"stdy", "study"},
                        {"studdy", "study"},
                        {"maen1", "mean1"},
                        {"desgin", "design"},
                        {"favors", "favours"},
                        {"item", "items"},
                        {"tail", "tails"},
                        {"ds1", "sd1"},
                        {"mean7", "mean1"},
                        // honest labels
                        {"sex", ""},
                        {"age", ""},
                        {"id", ""},
                        {"x", ""},
                        {"country", ""},
                        {"lab", ""},
                        {"site", ""},
                        {"notes", ""},
                        {"outcome", ""},
                        {"dose", ""},
                        {"", ""},
                        // known ones are no slips
                        {"t", ""},
                        {"mean2", ""}};
  for (const Case& c : cases) {
    INFO(c.written);
    const Column* near = near_column(c.written);
    CHECK((near == nullptr ? std::string_view() : near->name) == c.meant);
  }
  CHECK(near_column(std::string(100'000, 'm')) == nullptr);
}

TEST_CASE("the nearest word is within two edits, one for short words") {
  const std::array<std::string_view, 4> words = {"two_groups", "one_sample", "paired", "yes"};
  CHECK(nearest_word("pared", words) == "paired");
  CHECK(nearest_word("paierd", words) == "paired");
  CHECK(nearest_word("prd", words).empty());
  CHECK(nearest_word("yess", words) == "yes");
  CHECK(nearest_word("ye", words) == "yes");
  CHECK(nearest_word("y", words).empty());
  CHECK(nearest_word("two_gruops", words) == "two_groups");
  CHECK(nearest_word("between", words).empty());
}
