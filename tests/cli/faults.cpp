// What can go wrong around the command: nothing is lost, the message is plain, the exit status right.
#include <sys/stat.h>
#include <unistd.h>

#include <catch2/catch.hpp>
#include <nlohmann/json.hpp>
#include <string>

#include "cli/command.hpp"

using namespace steelyard::test;

namespace {

const std::string demo = dataset("demo.csv");

// The suite may run as root, for whom no folder is read-only: such commands run as nobody.
std::string as_ordinary_user() {
  return geteuid() == 0 ? "setpriv --reuid=65534 --regid=65534 --clear-groups " : "";
}

std::string many_studies(std::size_t count) {
  std::string text = "study,n1,n2,t\n";
  for (std::size_t i = 0; i < count; ++i) {
    text += "S" + std::to_string(i) + "," + std::to_string(10 + i % 90) + "," + std::to_string(12 + i % 70) +
            "," + std::to_string(i % 5) + "." + std::to_string(10 + i % 90) + "\n";
  }
  return text;
}

}  // namespace

TEST_CASE("a full disk is exit status 3, with a message", "[cli][faults]") {
  const Ran text = shell("$STEELYARD pool '" + demo + "' > /dev/full");
  CHECK(text.status == 3);
  CHECK_THAT(text.err, Catch::Contains("Standard output can't be written: no space is left on the device."));
  const Ran json = run_command({"pool", demo, "--json", "/dev/full"});
  CHECK(json.status == 3);
  CHECK_THAT(json.err, Catch::Contains("\"/dev/full\" can't be written: no space is left on the device."));
}

TEST_CASE("a file that grows too large leaves the old one whole", "[cli][faults]") {
  const Folder folder;
  const std::string target = folder.file("result.json", "old");
  // ulimit -f counts blocks of 512 bytes; the result is larger than one.
  const Ran ran =
      shell("ulimit -f 1; trap '' XFSZ; $STEELYARD pool '" + demo + "' --json '" + target + "' > /dev/null");
  CHECK(ran.status == 3);
  CHECK_THAT(ran.err, Catch::Contains("it would be larger than allowed"));
  CHECK(folder.read("result.json") == "old");
  CHECK(folder.names() == std::vector<std::string>{"result.json"});
}

TEST_CASE("targets that can't be written are reported before the work", "[cli][faults]") {
  const Folder folder;
  const Ran in_folder = run_command({"pool", demo, "--svg", folder.path(".")});
  CHECK(in_folder.status == 3);
  CHECK(in_folder.out.empty());
  CHECK_THAT(in_folder.err, Catch::Contains("can't be written: it is a folder."));
  const Ran nowhere = run_command({"pool", demo, "--svg", folder.path("no/such/folder.svg")});
  CHECK(nowhere.status == 3);
  CHECK_THAT(nowhere.err, Catch::Contains("there is no such file or folder."));
  CHECK(folder.names().empty());
}

TEST_CASE("a read-only folder and a protected file are left alone", "[cli][faults]") {
  const Folder folder;
  const std::string target = folder.file("result.json", "old");
  chmod(folder.path(".").c_str(), 0555);
  const Ran ran =
      shell(as_ordinary_user() + "$STEELYARD pool '" + demo + "' --json '" + folder.path("new.json") + "'");
  CHECK(ran.status == 3);
  CHECK_THAT(ran.err, Catch::Contains("you have no permission."));
  chmod(folder.path(".").c_str(), 0777);
  chmod(target.c_str(), 0444);
  const Ran kept = shell(as_ordinary_user() + "$STEELYARD pool '" + demo + "' --json '" + target + "'");
  CHECK(kept.status == 3);
  CHECK(folder.read("result.json") == "old");
  CHECK(folder.names() == std::vector<std::string>{"result.json"});
}

TEST_CASE("an unreadable input is exit status 3", "[cli][faults]") {
  const Folder folder;
  const std::string secret = folder.file("secret.csv", "study,t,n1,n2\nA,1,20,20\n");
  chmod(folder.path(".").c_str(), 0755);
  chmod(secret.c_str(), 0000);
  const Ran ran = shell(as_ordinary_user() + "$STEELYARD pool '" + secret + "'");
  CHECK(ran.status == 3);
  CHECK_THAT(ran.err, Catch::Contains("can't be read: you have no permission."));
}

TEST_CASE("the input is never overwritten", "[cli][faults]") {
  const Folder folder;
  const std::string file = folder.file("studies.csv", bytes_of(demo));
  const Ran ran = run_command({"pool", file, "--json", folder.path("./studies.csv")});
  CHECK(ran.status == 3);
  CHECK_THAT(ran.err, Catch::Contains("is the file that is read"));
  CHECK(folder.read("studies.csv") == bytes_of(demo));
}

TEST_CASE("a link is followed, and the mode of a replaced file is kept", "[cli][faults]") {
  const Folder folder;
  const std::string target = folder.file("real.json", "old");
  chmod(target.c_str(), 0640);
  REQUIRE(symlink("real.json", folder.path("link.json").c_str()) == 0);
  CHECK(run_command({"pool", demo, "--json", folder.path("link.json")}).status == 0);
  struct stat status {};
  REQUIRE(lstat(folder.path("link.json").c_str(), &status) == 0);
  CHECK(S_ISLNK(status.st_mode));
  REQUIRE(stat(target.c_str(), &status) == 0);
  CHECK((status.st_mode & 0777) == 0640);
  CHECK(nlohmann::json::parse(folder.read("real.json"))["command"] == "pool");
}

TEST_CASE("a pipe that is closed early ends the run quietly", "[cli][faults]") {
  for (const std::string arguments : {"--json -", "--svg -", ""}) {
    const Ran ran = shell("{ $STEELYARD pool '" + demo + "' " + arguments + "; echo status $? >&2; } | true");
    CHECK(ran.err == "status 0\n");
  }
  const Ran help = shell("{ $STEELYARD pool --help; echo status $? >&2; } | true");
  CHECK(help.err == "status 0\n");
}

TEST_CASE("a closed standard output is reported", "[cli][faults]") {
  const Ran ran = shell("$STEELYARD pool '" + demo + "' >&-");
  CHECK(ran.status == 3);
}

TEST_CASE("an interruption leaves the old file and no other", "[cli][faults]") {
  const Folder folder;
  const std::string input = folder.file("many.csv", many_studies(100000));
  const std::string target = folder.file("result.json", "old");
  for (const std::string signal : {"INT", "TERM", "HUP"}) {
    for (const std::string delay : {"0.02", "0.1", "0.4"}) {
      const Ran ran = shell("timeout -s " + signal + " " + delay + " $STEELYARD pool '" + input +
                            "' --json '" + target + "'");
      INFO(signal << " after " << delay << ": " << ran.err);
      const bool ended = ran.status == 124;  // what timeout says when it had to send the signal
      CHECK(ended);
      CHECK(folder.read("result.json") == "old");
      CHECK(folder.names() == std::vector<std::string>{"many.csv", "result.json"});
    }
  }
}

TEST_CASE("too little memory is a message and exit status 1", "[cli][faults]") {
  const Folder folder;
  const std::string input = folder.file("many.csv", many_studies(100000));
  const Ran ran = shell("ulimit -v 65536; $STEELYARD pool '" + input + "'");
  CHECK(ran.status == 1);
  CHECK(ran.out.empty());
  CHECK_THAT(ran.err, Catch::Contains("There is not enough memory for this input."));
}

TEST_CASE("two runs that write one file leave it whole", "[cli][faults]") {
  const Folder folder;
  const std::string target = folder.path("result.json");
  const std::string one = "$STEELYARD pool '" + demo + "' --json '" + target + "' > /dev/null";
  for (int i = 0; i < 5; ++i) {
    const Ran ran = shell(one + " & " + one + " & wait");
    CHECK(ran.err.empty());
    CHECK(nlohmann::json::parse(folder.read("result.json"))["command"] == "pool");
    CHECK(folder.names() == std::vector<std::string>{"result.json"});
  }
}

TEST_CASE("a message can't drive the terminal", "[cli][faults]") {
  const Folder folder;
  const Ran ran = run_command({"pool", folder.file("x.csv", "study,t,n1,n2\nA,\x1b[31mred\x07,20,20\n")});
  CHECK(ran.status == 1);
  CHECK(ran.err.find('\x1b') == std::string::npos);
  CHECK(ran.err.find('\x07') == std::string::npos);
  CHECK(run_command({"\x1b[2J"}).err.find('\x1b') == std::string::npos);
}

TEST_CASE("locale and clock change nothing", "[cli][faults]") {
  const Ran plain = run_command({"pool", demo, "--json", "-"});
  REQUIRE(plain.status == 0);
  for (const std::string locale : {"de_DE.UTF-8", "tr_TR.UTF-8", "ar_EG.UTF-8", "C.UTF-8", "nonsense", ""}) {
    Setting setting;
    setting.environment = {{"LC_ALL", locale}, {"LANG", locale}};
    CHECK(run_command({"pool", demo, "--json", "-"}, setting).out == plain.out);
  }
  Setting zone;
  zone.environment = {{"TZ", "Pacific/Kiritimati"}, {"SOURCE_DATE_EPOCH", "0"}};
  CHECK(run_command({"pool", demo, "--json", "-"}, zone).out == plain.out);
}
