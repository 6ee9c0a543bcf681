// Help, man pages, completions and docs against the one table of options.
#include "cli/reference.hpp"

#include <catch2/catch.hpp>

#include <set>
#include <string>

#include "cli/arguments.hpp"
#include "cli/command.hpp"
#include "cli/help.hpp"
#include "cli/manual.hpp"
#include "cli/options.hpp"

using namespace steelyard;
using namespace steelyard::cli;

TEST_CASE("every option is told by help, man page and all completions", "[cli][options]") {
  for (const CommandInfo& command : command_table()) {
    const std::string help = command_help(command, 80);
    const std::string page = manual(command);
    for (const OptionInfo* option : options_of(command.id)) {
      const std::string name(option->name);
      INFO(command.name << " " << name);
      CHECK_THAT(help, Catch::Contains(" " + name));
      std::string in_roff;
      for (const char c : name) in_roff += c == '-' ? std::string("\\-") : std::string(1, c);
      CHECK_THAT(page, Catch::Contains(".B " + in_roff));
      CHECK_THAT(bash_completion(), Catch::Contains(name));
      CHECK_THAT(zsh_completion(), Catch::Contains(name));
      CHECK_THAT(fish_completion(), Catch::Contains("-l " + name.substr(2)));
    }
  }
}

TEST_CASE("the table of options keeps its own rules", "[cli][options]") {
  std::set<std::string> names;
  for (const OptionInfo& option : option_table()) {
    INFO(option.name);
    CHECK(names.insert(std::string(option.name)).second);
    CHECK(option.name.substr(0, 2) == "--");
    CHECK(option.meaning.back() == '.');
    CHECK((option.kind == ValueKind::none) == option.value.empty());
    CHECK((option.kind == ValueKind::choice) == !option.choices.empty());
  }
}

TEST_CASE("a stated default is accepted as a value and changes nothing", "[cli][options]") {
  for (const CommandInfo& command : command_table()) {
    for (const OptionInfo* option : options_of(command.id)) {
      if (option->fallback.empty() || option->name == "--width") continue;
      INFO(option->name);
      Options given;
      CHECK(option->apply(given, option->fallback).empty());
      const Options plain;
      CHECK(given.analysis.pool.level == plain.analysis.pool.level);
      CHECK(given.analysis.rebuild.alpha == plain.analysis.rebuild.alpha);
      CHECK(given.analysis.priors.model == plain.analysis.priors.model);
      CHECK(to_text(given.analysis.priors.effect) == to_text(plain.analysis.priors.effect));
      CHECK(to_text(given.analysis.priors.spread) == to_text(plain.analysis.priors.spread));
    }
  }
}

TEST_CASE("help lines fit the width", "[cli][help]") {
  for (const std::size_t width : {60, 80, 120}) {
    std::string text = general_help(width);
    for (const CommandInfo& command : command_table()) text += command_help(command, width);
    std::size_t start = 0;
    for (std::size_t end = 0; (end = text.find('\n', start)) != std::string::npos; start = end + 1) {
      const std::string line = text.substr(start, end - start);
      INFO(line);
      // Examples are not broken: they are there to be copied.
      if (line.rfind("  steelyard ", 0) != 0) CHECK(line.size() <= width);
    }
  }
}

TEST_CASE("generated pages of docs/ are up to date", "[cli][docs]") {
  for (const Page& page : reference_pages()) {
    INFO(page.path << " is out of date; write it anew with steelyard_generate --docs docs");
    CHECK((test::bytes_of(std::string(STEELYARD_DOCS_DIR "/") + page.path) == page.text));
  }
}

TEST_CASE("an option's value may look like anything", "[cli][arguments]") {
  const Request request =
      read_arguments({"pool", "f.csv", "--without", "--json", "--without=-1", "--level=0.9"});
  REQUIRE(request.problems.empty());
  CHECK(request.options.analysis.without == std::vector<std::string>{"--json", "-1"});
  CHECK(request.options.analysis.pool.level == 0.9);
  CHECK(request.options.json.empty());
}

TEST_CASE("behind two dashes everything is a file", "[cli][arguments]") {
  const Request request = read_arguments({"pool", "--", "-odd.csv"});
  CHECK(request.problems.empty());
  CHECK(request.options.file == "-odd.csv");
}

TEST_CASE("model priors are divided by their sum", "[cli][arguments]") {
  const Request request = read_arguments({"pool", "f.csv", "--model-priors", "2,2,0,0"});
  REQUIRE(request.problems.empty());
  CHECK(request.options.analysis.priors.model == std::array<double, model_count>{0.5, 0.5, 0.0, 0.0});
}
