#include "render/json/writer.hpp"

#include <catch2/catch.hpp>

#include <cmath>
#include <limits>
#include <nlohmann/json.hpp>
#include <string>

using steelyard::Sink;

using steelyard::json::Writer;

namespace {

std::string number(double value) {
  std::string out;
  const Sink sink = [&out](std::string_view bytes) { out += bytes; };
  Writer writer(sink);
  writer.number(value);
  writer.finish();
  out.pop_back();
  return out;
}

}  // namespace

TEST_CASE("numbers are the shortest text that reads back to the same double", "[json]") {
  CHECK(number(0.1) == "0.1");
  CHECK(number(-2.0) == "-2");
  CHECK(number(1.0 / 3.0) == "0.3333333333333333");
  CHECK(number(5e-324) == "5e-324");
  for (const double value :
       {0.1, 1.0 / 3.0, 2.2250738585072014e-308, 1.7976931348623157e308, -123456.789e-30}) {
    CHECK(nlohmann::json::parse(number(value)).get<double>() == value);
  }
}

TEST_CASE("what is not finite is null", "[json]") {
  CHECK(number(std::nan("")) == "null");
  CHECK(number(std::numeric_limits<double>::infinity()) == "null");
  CHECK(number(-std::numeric_limits<double>::infinity()) == "null");
}

TEST_CASE("texts come back as they were, whatever stands in them", "[json]") {
  const std::string hostile =
      "a\"b\\c\n\t\r\x01\x1f\x7f </script> \xc3\xa9 \xe4\xb8\xad \xf0\x9f\x99\x82 ]]>";
  CHECK(nlohmann::json::parse(steelyard::json::quoted(hostile)).get<std::string>() == hostile);
}

TEST_CASE("invalid UTF-8 becomes U+FFFD, so that the document stays valid", "[json]") {
  const std::string mark = "\xEF\xBF\xBD";
  CHECK(steelyard::json::quoted("a\xff") == "\"a" + mark + "\"");
  CHECK(steelyard::json::quoted("\xc0\xaf") == "\"" + mark + mark + "\"");             // overlong
  CHECK(steelyard::json::quoted("\xed\xa0\x80") == "\"" + mark + mark + mark + "\"");  // a surrogate
  CHECK(steelyard::json::quoted("\xf4\x90\x80\x80") ==
        "\"" + mark + mark + mark + mark + "\"");                           // beyond U+10FFFF
  CHECK(steelyard::json::quoted("\xe4\xb8") == "\"" + mark + mark + "\"");  // cut short
}

TEST_CASE("the outer levels stand one member a line, the inner ones on one line", "[json]") {
  std::string out;
  const Sink sink = [&out](std::string_view bytes) { out += bytes; };
  Writer writer(sink);
  writer.begin_object();
  writer.key("list");
  writer.begin_array();
  for (int i = 0; i < 2; ++i) {
    writer.begin_object();
    writer.key("a");
    writer.begin_array();
    writer.integer(1);
    writer.boolean(true);
    writer.end_array();
    writer.end_object();
  }
  writer.end_array();
  writer.key("none");
  writer.begin_object();
  writer.end_object();
  writer.end_object();
  writer.finish();
  CHECK(out ==
        "{\n  \"list\": [\n    {\"a\": [1, true]},\n    {\"a\": [1, true]}\n  ],\n  \"none\": {}\n}\n");
}
