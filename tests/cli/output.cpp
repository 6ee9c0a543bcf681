// Where results go: standard output, files that are whole or not there, pipes that close early.
#include <sys/stat.h>
#include <unistd.h>

#include <catch2/catch.hpp>
#include <nlohmann/json.hpp>
#include <string>

#include "cli/command.hpp"
#include "steelyard/version.hpp"

using namespace steelyard::test;

namespace {

const std::string demo = dataset("demo.csv");

bool plain_ascii(const std::string& text) {
  for (const char c : text) {
    if (static_cast<unsigned char>(c) > 126 || (static_cast<unsigned char>(c) < 32 && c != '\n'))
      return false;
  }
  return true;
}

}  // namespace

TEST_CASE("the version and the help go to standard output", "[cli]") {
  const Ran version = run_command({"--version"});
  CHECK(version.status == 0);
  CHECK(version.out == "steelyard " STEELYARD_VERSION "\n");
  for (const auto& arguments :
       {std::vector<std::string>{"--help"}, {"pool", "--help"}, {"help", "check"}, {"check", "-h"}}) {
    const Ran help = run_command(arguments);
    CHECK(help.status == 0);
    CHECK(help.err.empty());
    CHECK_THAT(help.out, Catch::Contains("Examples:") && Catch::Contains("Exit status:"));
  }
}

TEST_CASE("pool prints the answer and nothing on standard error", "[cli]") {
  const Ran ran = run_command({"pool", demo});
  CHECK(ran.status == 0);
  CHECK(ran.err.empty());
  CHECK_THAT(ran.out, Catch::Contains("Alder 1994") && Catch::Contains("decibans"));
}

TEST_CASE("standard input does as well as a file", "[cli]") {
  Setting setting;
  setting.input = bytes_of(demo);
  const Ran named = run_command({"pool", demo, "--json", "-"});
  const Ran piped = run_command({"pool", "-", "--json", "-"}, setting);
  const Ran silent = run_command({"pool", "--json", "-"}, setting);
  CHECK(piped.status == 0);
  CHECK(piped.out == silent.out);
  auto a = nlohmann::json::parse(named.out);
  auto b = nlohmann::json::parse(piped.out);
  CHECK(b["input"]["file"] == "-");
  a["input"].erase("file");
  b["input"].erase("file");
  a.erase("cautions");
  b.erase("cautions");
  CHECK(a == b);
}

TEST_CASE("with --json - the result is the only thing on standard output", "[cli]") {
  for (const std::string command : {"pool", "check"}) {
    const Ran ran = run_command({command, demo, "--json", "-"});
    CHECK(ran.status == 0);
    CHECK(nlohmann::json::parse(ran.out)["command"] == command);
  }
}

TEST_CASE("files are written beside the text", "[cli]") {
  const Folder folder;
  const Ran ran =
      run_command({"pool", demo, "--svg", folder.path("forest.svg"), "--json", folder.path("result.json")});
  CHECK(ran.status == 0);
  CHECK_FALSE(ran.out.empty());
  CHECK(folder.names() == std::vector<std::string>{"forest.svg", "result.json"});
  CHECK_THAT(folder.read("forest.svg"), Catch::Contains("<svg") && Catch::EndsWith("\n"));
  CHECK(nlohmann::json::parse(folder.read("result.json"))["command"] == "pool");
}

TEST_CASE("text is ASCII unless the locale is UTF-8, and never coloured into a file", "[cli]") {
  for (const std::string command : {"pool", "check"}) {
    CHECK(plain_ascii(run_command({command, demo}).out));
    Setting utf8;
    utf8.environment = {{"LANG", "C.UTF-8"}};
    const std::string text = run_command({command, demo}, utf8).out;
    CHECK(text.find('\x1b') == std::string::npos);
    Setting posix;
    posix.environment = {{"LANG", "de_DE.UTF-8"}, {"LC_ALL", "C"}};
    CHECK(plain_ascii(run_command({command, demo}, posix).out));
    CHECK(run_command({command, demo, "--glyphs", "unicode"}).out == text);
  }
}

TEST_CASE("colour can be forced, and NO_COLOR is obeyed on a terminal", "[cli]") {
  CHECK_THAT(run_command({"pool", demo, "--colour", "always"}).out, Catch::Contains("\x1b["));
  // `script` gives the command a terminal.
  const std::string line = "script -qec \"$STEELYARD pool '" + demo + "' 2> /dev/null\" /dev/null < /dev/null";
  CHECK_THAT(shell(line).out, Catch::Contains("\x1b["));
  Setting setting;
  setting.environment = {{"NO_COLOR", "1"}};
  CHECK_THAT(shell(line, setting).out, !Catch::Contains("\x1b["));
}

TEST_CASE("lines keep to the width", "[cli]") {
  for (const std::string width : {"60", "80", "132"}) {
    Setting setting;
    setting.environment = {{"COLUMNS", width}};
    const std::string text = run_command({"pool", demo}, setting).out;
    CHECK(run_command({"pool", demo, "--width", width}).out == text);
    std::size_t start = 0;
    for (std::size_t end = 0; (end = text.find('\n', start)) != std::string::npos; start = end + 1) {
      INFO(text.substr(start, end - start));
      CHECK(end - start <= std::stoul(width));
    }
  }
}

TEST_CASE("--fail-on turns findings into exit status 4, after the result is written", "[cli]") {
  const Folder folder;
  const std::string file = folder.file("odd.csv", "study,n1,n2,t,p\nA,20,20,2.10,.003\nB,20,20,1.00,.32\n");
  const Ran ran = run_command({"pool", file, "--fail-on", "impossible", "--json", folder.path("r.json")});
  CHECK(ran.status == 4);
  CHECK_FALSE(ran.out.empty());
  CHECK(nlohmann::json::parse(folder.read("r.json"))["studies"][0]["findings"].size() >= 1);
  CHECK(run_command({"check", file, "--fail-on", "impossible"}).status == 4);
  CHECK(run_command({"check", file}).status == 0);
}

TEST_CASE("what is left out is in every output", "[cli]") {
  const Ran text = run_command({"pool", demo, "--without", "Alder 1994"});
  CHECK(text.status == 0);
  CHECK_THAT(text.out, Catch::Contains("Alder 1994"));
  const auto result =
      nlohmann::json::parse(run_command({"pool", demo, "--without", "Alder 1994", "--json", "-"}).out);
  CHECK(result["left_out"] == nlohmann::json::array({"Alder 1994"}));
  CHECK(result["studies"].size() + 1 == result["input"]["rows"].size());
  CHECK_THAT(run_command({"check", demo, "--without", "row 1"}).out, Catch::Contains("Alder 1994"));
  const Ran wrong = run_command({"pool", demo, "--without", "Alder 1995"});
  CHECK(wrong.status == 1);
  CHECK_THAT(wrong.err, Catch::Contains("Did you mean \"Alder 1994\"?"));
}

TEST_CASE("a run is repeated from its own result", "[cli]") {
  const Folder folder;
  const std::string first = folder.path("first.json");
  const Ran made = run_command({"pool", demo, "--level", "0.9", "--direction", "greater", "--without",
                                "Gorse 2012", "--effect-prior", "normal(0.1, 0.6)", "--json", first});
  REQUIRE(made.status == 0);
  const Ran again = run_command({"pool", "--from", first, "--json", "-"});
  CHECK(again.status == 0);
  CHECK(again.out == folder.read("first.json"));
  const auto changed =
      nlohmann::json::parse(run_command({"pool", "--from", first, "--level", "0.5", "--json", "-"}).out);
  CHECK(changed["options"]["level"] == 0.5);
  CHECK(changed["priors"]["direction"] == "greater");
  CHECK(run_command({"pool", "--from", demo}).status == 1);
}

TEST_CASE("legal oddities are pooled, each with its caution", "[cli]") {
  const Folder folder;
  for (const std::string row : {"A,20,20,50,", "A,1,20,2.1,", "A,20,20,,.000"}) {
    const Ran ran =
        run_command({"pool", folder.file("odd.csv", "study,n1,n2,t,p\n" + row + "\n"), "--json", "-"});
    INFO(row << "\n" << ran.err);
    REQUIRE(ran.status == 0);
    const auto result = nlohmann::json::parse(ran.out);
    CHECK(result["cautions"].size() + result["studies"][0]["cautions"].size() >= 1);
  }
}

TEST_CASE("data sets of the project can be pooled", "[cli]") {
  CHECK(run_command({"pool", dataset("no-effect.csv")}).status == 0);
  CHECK(run_command({"pool", dataset("heterogeneous.csv")}).status == 0);
  CHECK(run_command({"pool", dataset("sleep.csv")}).status == 0);
  CHECK(run_command({"pool", dataset("eight-schools.csv")}).status == 1);
  CHECK(run_command({"pool", dataset("eight-schools.csv"), "--effect-prior", "normal(0, 15)",
                     "--spread-prior", "half-normal(10)"})
            .status == 0);
}
