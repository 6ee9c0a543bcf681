// Everything that people hand to the command by mistake: each gets a message that says where and what
// to do, on standard error, and the right exit status. Nothing appears on standard output.
#include <catch2/catch.hpp>

#include <string>
#include <vector>

#include "cli/command.hpp"

using steelyard::test::dataset;
using steelyard::test::Folder;
using steelyard::test::Ran;
using steelyard::test::run_command;
using steelyard::test::shell;

namespace {

struct Case {
  std::string name;
  std::string file;  // its bytes
  int status;
  std::vector<std::string> messages;  // each must stand on standard error
};

std::string repeated(const std::string& text, std::size_t times) {
  std::string all;
  for (std::size_t i = 0; i < times; ++i) all += text;
  return all;
}

const std::vector<Case> unusable = {
    {"an empty file", "", 1, {"error:"}},
    {"a header only", "study,t,n1,n2\n", 1, {"error:"}},
    {"a negative SD",
     "study,mean1,sd1,n1,mean2,sd2,n2\nA,5.1,-1.2,20,4.4,1.1,20\n",
     1,
     {":2:7: error:", "-1.2"}},
    {"an SD of zero", "study,mean1,sd1,n1,mean2,sd2,n2\nA,5.1,0,20,4.4,1.1,20\n", 1, {":2:7: error:"}},
    {"n of 0", "study,t,n1,n2\nA,2.1,0,20\n", 1, {":2:7: error:"}},
    {"no df left", "study,t,n\nA,2.1,1\n", 1, {":2:", "error:"}},
    {"a fractional n", "study,t,n1,n2\nA,2.1,20.5,20\n", 1, {":2:7: error:", "20.5"}},
    {"text in a number", "study,t,n1,n2\nA,strong,20,20\n", 1, {":2:3: error:", "strong"}},
    {"NaN", "study,t,n1,n2\nA,NaN,20,20\n", 1, {":2:3: error:", "NaN"}},
    {"inf", "study,t,n1,n2\nA,inf,20,20\n", 1, {":2:3: error:", "inf"}},
    {"1e400", "study,t,n1,n2\nA,1e400,20,20\n", 1, {":2:3: error:", "1e400"}},
    {"a column that looks like a known one", "study,t,n1,n_2\nA,2.1,20,20\n", 1, {"n_2", "n2"}},
    {"a CI the wrong way round",
     "study,mean_diff,ci_low,ci_high,n1,n2\nA,1,2,0.5,20,20\n",
     1,
     {":2:", "error:"}},
    {"a p of 1.2", "study,p,sign,n1,n2\nA,1.2,+,20,20\n", 1, {":2:3: error:", "1.2"}},
    {"invalid UTF-8", "study,t,n1,n2\nA\xff,2.1,20,20\n", 1, {":2:2: error:", "UTF-8"}},
    {"broken quoting", "study,t,n1,n2\n\"A,2.1,20,20\nB,1,20,20\n", 1, {":2:1: error:"}},
    {"text behind a closing quote", "study,t,n1,n2\n\"A\"x,2.1,20,20\n", 1, {":2:", "error:"}},
    {"deeply nested JSON", repeated("[", 100000) + repeated("]", 100000), 1, {":1:", "error:"}},
    {"broken JSON", "[{\"study\": \"A\", \"t\": 2.1,}]", 1, {":1:", "error:"}},
    {"a row that can't be rebuilt", "study,t,n1,n2\nA,2.1,,\n", 1, {":2:", "error:", "n1"}},
    {"a line of a megabyte", "study,t,n1,n2\n" + repeated("x", 1000000) + "\n", 1, {":2:", "error:"}},
    {"several problems at once",
     "study,t,n1,n2\nA,strong,0,20\nB,2.1,20,x\n",
     1,
     {":2:3: error:", ":3:10: error:"}},
};

}  // namespace

TEST_CASE("files that can't be used are refused with place and remedy", "[cli][bad-input]") {
  const Folder folder;
  for (const Case& one : unusable) {
    for (const std::string command : {"pool", "check"}) {
      DYNAMIC_SECTION(command << ": " << one.name) {
        const std::string path = folder.file("studies.csv", one.file);
        const Ran ran = run_command({command, path});
        INFO(ran.err.substr(0, 2000));
        CHECK(ran.status == one.status);
        const bool checks = command == "check";  // which shows what it can all the same
        if (!checks) CHECK(ran.out.empty());
        CHECK(ran.err.find(path) != std::string::npos);
        for (const std::string& message : one.messages) {
          CHECK_THAT(checks ? ran.out + ran.err : ran.err, Catch::Contains(message));
        }
        CHECK(ran.err.size() < 40000);
      }
    }
  }
}

TEST_CASE("mixed metrics are not pooled", "[cli][bad-input]") {
  const Folder folder;
  const std::string path =
      folder.file("studies.csv", "study,t,n1,n2,estimate,se,metric\nA,2.1,20,20,,,\nB,,,,3,1,points\n");
  const Ran ran =
      run_command({"pool", path, "--effect-prior", "normal(0, 1)", "--spread-prior", "half-normal(1)"});
  CHECK(ran.status == 1);
  CHECK_THAT(ran.err, Catch::Contains("metric") && Catch::Contains("points"));
}

TEST_CASE("a file that can't be read is exit status 3", "[cli][bad-input]") {
  const Folder folder;
  SECTION("missing") {
    const Ran ran = run_command({"pool", folder.path("nowhere.csv")});
    CHECK(ran.status == 3);
    CHECK_THAT(ran.err, Catch::Contains("nowhere.csv\" can't be read: there is no such file or folder."));
  }
  SECTION("a folder") {
    const Ran ran = run_command({"pool", folder.path(".")});
    CHECK(ran.status == 3);
    CHECK_THAT(ran.err, Catch::Contains("is a folder. Give the name of a file"));
  }
}

TEST_CASE("a line of 200 MB is refused without much ado", "[cli][bad-input]") {
  const Ran ran =
      shell("{ echo study,t,n1,n2; head -c 200000000 /dev/zero | tr '\\0' x; } | $STEELYARD pool -");
  CHECK(ran.status == 1);
  CHECK_THAT(ran.err, Catch::Contains("-:2:") && Catch::Contains("error:"));
  CHECK(ran.err.size() < 2000);
}

TEST_CASE("at most 100 problems are listed, then their number", "[cli][bad-input]") {
  std::string file = "study,t,n1,n2\n";
  for (int i = 0; i < 250; ++i) file += "S" + std::to_string(i) + ",wrong,20,20\n";
  const Folder folder;
  const Ran ran = run_command({"pool", folder.file("many.csv", file)});
  CHECK(ran.status == 1);
  CHECK_THAT(ran.err, Catch::Contains("There are 151 more problems"));
  std::size_t lines = 0;
  for (const char c : ran.err) lines += c == '\n' ? 1 : 0;
  CHECK(lines <= 101);
}

TEST_CASE("a command line that is wrong is exit status 2", "[cli][usage]") {
  struct Wrong {
    std::vector<std::string> arguments;
    std::string message;
  };
  const std::string demo = dataset("demo.csv");
  const std::vector<Wrong> wrong = {
      {{}, "No command is given. steelyard --help lists the commands."},
      {{"pol", demo}, "There is no command \"pol\". Did you mean \"pool\"?"},
      {{"frobnicate"}, "There is no command \"frobnicate\". steelyard --help lists the commands."},
      {{"--svg", "x.svg", "pool", demo}, "\"--svg\" stands before the command."},
      {{"pool", demo, "--jsn", "x"}, "steelyard pool has no option \"--jsn\". Did you mean \"--json\"?"},
      {{"check", demo, "--svg", "x"},
       "steelyard check has no option \"--svg\"; it belongs to other commands."},
      {{"pool", demo, "--svg"}, "--svg needs a value: --svg FILE."},
      {{"pool", demo, "--level", "95"},
       "--level: \"95\" is not a number between 0 and 1. Give one like 0.9."},
      {{"pool", demo, "--level", "0.9", "--level", "0.8"}, "--level is given 2 times. Give it once."},
      {{"pool", demo, "--direction", "grater"}, "Did you mean \"greater\"?"},
      {{"pool", demo, "--effect-prior", "cauchy(0,"}, "--effect-prior: "},
      {{"pool", demo, "--effect-prior", "cauchi(0, 1)"}, "cauchy"},
      {{"pool", demo, "--effect-prior", "uniform(-1, -0.5)", "--direction", "greater"}, "--effect-prior: "},
      {{"pool", demo, "--spread-prior", "half-normal(-1)"}, "--spread-prior: "},
      {{"pool", demo, "--model-priors", "1,1,1"}, "--model-priors: \"1,1,1\" is not four weights"},
      {{"pool", demo, "--model-priors", "0,0,0,0"}, "--model-priors: "},
      {{"pool", demo, "--fail-on", "bad"}, "is not one of worth-a-look, changes-the-verdict or impossible."},
      {{"pool", demo, "--width", "12"}, "--width: \"12\" is not a whole number from 40 to 1000."},
      {{"pool", demo, "--svg", "-", "--json", "-"}, "can't both go to standard output"},
      {{"pool", demo, "--svg", "a", "--json", "a"}, "name the same file"},
      {{"pool", demo, "second.csv"}, "Only one file can be read at a time"},
      {{"pool", "--from", "r.json", demo}, "is one file too many"},
  };
  for (const Wrong& one : wrong) {
    const Ran ran = run_command(one.arguments);
    INFO(ran.err);
    CHECK(ran.status == 2);
    CHECK(ran.out.empty());
    CHECK_THAT(ran.err, Catch::Contains(one.message));
  }
}
