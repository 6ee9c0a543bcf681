// JSON into tables: what is legal, what is refused, word for word; results read back.
#include <catch2/catch.hpp>

#include <string>

#include "read/helpers.hpp"
#include "steelyard/read.hpp"

using namespace steelyard;
using test::cells_of;
using test::messages;

TEST_CASE("legal JSON") {
  struct Case {
    const char* what;
    std::string text;
    std::string cells;
  };
  const Case cases[] = {
      {"array", R"([{"study": "A", "t": 2.10, "n1": 20}])", "line 1 study=A@1:12 t=2.10@1:22 n1=20@1:34"},
      {"member", "{\"studies\": [\n {\"t\": 2.10}]}", "line 2 t=2.10@2:8"},
      {"numbers as they are written", R"([{"t": 2.10, "p": 1e-3, "d": -0.50, "n": 20}])",
       "line 1 t=2.10@1:8 p=1e-3@1:19 d=-0.50@1:30 n=20@1:42"},
      {"minus zero", R"([{"t": -0}])", "line 1 t=-0@1:8"},
      {"numbers as texts", R"([{"t": " 2.10 ", "p": "<.05"}])", "line 1 t=2.10@1:8 p=<.05@1:23"},
      {"null and missing members are empty", R"([{"t": 1, "p": null}, {"n": 3}])",
       "line 1 t=1@1:8 | line 1 n=3@1:29"},
      {"true and false", R"([{"t": 1, "reverse": true, "x": false}])",
       "line 1 t=1@1:8 reverse=yes@1:22 x=false@1:33"},
      {"escapes", R"([{"t": 1, "study": "a\"\\\/\n\t\u00e9\ud83d\ude00"}])",
       "line 1 t=1@1:8 study=a\"\\/\n\té😀@1:20"},
      {"blanks everywhere", " \r\n[ { \"t\" : 1 } ,\n\t{ \"t\" : 2 } ] \n",
       "line 2 t=1@2:11 | line 3 t=2@3:10"},
      {"columns count characters", R"([{"study": "Łódź", "t": 1}])", "line 1 study=Łódź@1:12 t=1@1:25"},
      {"byte order mark", "\xEF\xBB\xBF[{\"t\": 1}]", "line 1 t=1@1:8"},
      {"decimal comma in texts", R"([{"t": "2,1", "d": "0,5"}])", "line 1 t=2,1@1:8 d=0,5@1:20"},
      {"plain members beside the studies", R"({"source": "invented", "studies": [{"t": 1}]})",
       "line 1 t=1@1:42"},
  };
  for (const Case& c : cases) {
    INFO(c.what);
    const Outcome<Table> outcome = read_table(c.text, "f.json");
    CHECK(messages(outcome) == "");
    REQUIRE(outcome.ok());
    CHECK(cells_of(*outcome.value) == c.cells);
    for (const Row& row : outcome.value->rows) CHECK(row.cells.size() == outcome.value->names.size());
  }
}

TEST_CASE("a JSON number keeps its digits") {
  const Outcome<Table> outcome = read_json(R"([{"t": 2.10}])", "f.json");
  REQUIRE(outcome.ok());
  CHECK(outcome.value->rows[0].cells[0].printed.low == 2.095);
}

TEST_CASE("a result document gives back its rows") {
  const std::string result = R"({"steelyard": "0.1.0", "schema": 1, "command": "pool",
    "input": {"file": "a.csv", "sha256": "00", "rows": [
      {"line": 2, "cells": {"study": "A", "t": "2,10", "as_printed": "p = ,036"}},
      {"line": 7, "cells": {"t": "<1"}, "more": [1, {}]}]},
    "priors": {"effect": "x"},
    "studies": [{"study": "A", "effect": {"d": 0.5}}]})";
  const Outcome<Table> outcome = read_table(result, "r.json");
  CHECK(messages(outcome) == "");
  REQUIRE(outcome.ok());
  const Table& table = *outcome.value;
  CHECK(cells_of(table) == "line 2 study=A@2:0 t=2,10@2:0 as_printed=p = ,036@2:0 | line 7 t=<1@7:0");
  CHECK(table.style.decimal_comma);
  CHECK(table.cell(table.rows[0], "p")->printed.value == .036);
}

TEST_CASE("JSON that can't be used, word for word") {
  const std::string mend = "Correct the JSON at this place; what follows was not read. [json-syntax]\n";
  const std::string flat = "A table is an array of flat objects, one for each study. [json-too-deep]\n";
  const std::string escape =
      "error: What follows the backslash here is not a character. Write a backslash as \\\\; \\u needs four "
      "hexadecimal digits that make a character. [json-escape]\n";
  struct Case {
    const char* what;
    std::string text;
    std::string messages;
  };
  const Case cases[] = {
      {"no studies", "[]",
       "f:1:1: error: There are no studies in this file. Write an object for each study into the array. "
       "[no-rows]\n"},
      {"objects without members", "[{}, {}]",
       "f:1: error: The objects of the studies have no members. Write each study like {\"study\": \"A\", "
       "\"t\": 2.1, "
       "\"n1\": 20, \"n2\": 20}. [json-row]\n"},
      {"no array", R"({"a": 1})",
       "f:1:1: error: This JSON object has no array \"studies\". Write an array of objects, [{\"study\": "
       "\"A\", \"t\": "
       "2.1, ...}, ...], or put it in {\"studies\": [...]}. [json-no-studies]\n"},
      {"a result without rows", R"({"steelyard": "0.1.0", "studies": [{"t": 1}]})",
       "f:1:1: error: This result document does not carry the rows that it was made from. Write an array of "
       "objects, "
       "[{\"study\": \"A\", \"t\": 2.1, ...}, ...], or put it in {\"studies\": [...]}. [json-no-studies]\n"},
      {"studies twice", R"({"studies": [{"t": 1}], "studies": [{"t": 2}]})",
       "f:1:25: error: The member \"studies\" stands twice. Put all studies in one array. [json-member]\n"},
      {"ends early", R"([{"t": 1)",
       "f:1:9: error: The file ends where \",\" or \"}\" is expected. Check that it was saved whole. "
       "[json-syntax]\n"},
      {"comma at the end", R"([{"t": 1},])",
       "f:1:11: error: A study must be an object with the columns as names. Write it like {\"study\": \"A\", "
       "\"t\": 2.1, "
       "\"n1\": 20, \"n2\": 20}. [json-row]\n"
       "f:1:11: error: Here stands \"]\" where a number, a text in quotes, true, false or null is "
       "expected. " +
           mend},
      {"name without quotes", R"([{t: 1}])",
       "f:1:3: error: Here stands \"t\" where a name in quotes is expected. " + mend},
      {"no colon", R"([{"t" 1}])", "f:1:7: error: Here stands \"1\" where \":\" is expected. " + mend},
      {"text behind", R"([{"t": 1}] x)",
       "f:1:12: error: Here stands \"x\" where the end of the file is expected. " + mend},
      {"leading zero", R"([{"t": 01}])",
       "f:1:9: error: Here stands \"1\" where \",\" or \"}\" is expected. " + mend},
      {"point at the end", R"([{"t": 1.}])",
       "f:1:10: error: Here stands \"}\" where a number, a text in quotes, true, false or null is "
       "expected. " +
           mend},
      {"NaN", R"([{"t": NaN}])",
       "f:1:8: error: Here stands \"N\" where a number, a text in quotes, true, false or null is expected. " +
           mend},
      {"too large", R"([{"t": 1e400, "d": 1e400}])",
       "f:1:8: error: \"1e400\" is too large or too close to 0 to compute with. Check its exponent. "
       "[number-out-of-range]\n"
       "f:1:20: error: \"1e400\" is too large or too close to 0 to compute with. Check its exponent. "
       "[number-out-of-range]\n"},
      {"quote never closed", R"([{"t": "1}])",
       "f:1:8: error: The quote that opens this text is never closed. Close the quote, and write a quote "
       "inside the "
       "text as \\\". [quote-not-closed]\n"},
      {"bare line end", "[{\"t\": \"1\n\"}]",
       "f:2:1: error: A text in quotes breaks off here: it contains a control character. Write a line end "
       "inside a text "
       "as \\n and a tab as \\t. [json-syntax]\n"},
      {"unknown escape", R"([{"study": "\x"}])", "f:1:14: " + escape},
      {"lone surrogate", R"([{"study": "\ud800"}])", "f:1:19: " + escape},
      {"surrogate and letter", R"([{"study": "\ud800\u0041"}])", "f:1:25: " + escape},
      {"zero", R"([{"study": "\u0000"}])", "f:1:19: " + escape},
      {"not an object", R"([1, {"t": 1}])",
       "f:1:2: error: A study must be an object with the columns as names. Write it like {\"study\": \"A\", "
       "\"t\": 2.1, "
       "\"n1\": 20, \"n2\": 20}. [json-row]\n"},
      {"nested value", R"([{"t": [1, 2], "study": {"a": {}}}])",
       "f:1:8: error: The value of \"t\" is an object or an array, but a cell holds one thing. Write a "
       "number or a text. "
       "[json-nested]\n"
       "f:1:25: error: The value of \"study\" is an object or an array, but a cell holds one thing. Write a "
       "number or a "
       "text. [json-nested]\n"},
      {"name twice", R"([{"t": 1, "t": 2}])",
       "f:1:11: error: The name \"t\" stands twice in this object. Rename or remove one of them. "
       "[duplicate-column]\n"},
      {"blank name", R"([{"t": 1, " ": 2}])",
       "f:1:11: error: This name is blank. Name the column. [column-without-name]\n"},
      {"deep", R"([{"t": )" + std::string(1'000'000, '['),
       "f:1:8: error: The value of \"t\" is an object or an array, but a cell holds one thing. Write a "
       "number or a text. "
       "[json-nested]\nf:1:70: error: Objects or arrays are nested more than 64 deep here. " +
           flat},
      {"deep elsewhere", "{\"a\":" + std::string(1'000'000, '['),
       "f:1:2: caution: The member \"a\" is not read. Studies stand in an array called \"studies\". "
       "[json-member]\n"
       "f:1:70: error: Objects or arrays are nested more than 64 deep here. " +
           flat},
      {"not UTF-8", "[{\"study\": \"M\xFCller\"}]",
       "f:1:14: error: The byte 0xFC here isn't UTF-8 text. Save the file again as UTF-8. [not-utf8]\n"},
      {"no known name", R"([{"a": 1}])",
       "f:1:3: error: None of the columns is known: \"a\". The first line must name the columns, for example "
       "study,t,n1,n2; docs/formats.md lists them. [no-known-column]\n"},
      {"percent", R"([{"t": "5%"}])",
       "f:1:8: error: \"5%\" is a percentage, but the column \"t\" does not hold probabilities. Write the "
       "number itself. "
       "[percent-outside-p]\n"},
  };
  for (const Case& c : cases) {
    INFO(c.what);
    const Outcome<Table> outcome = read_table(c.text, "f");
    CHECK_FALSE(outcome.ok());
    CHECK(messages(outcome) == c.messages);
  }
}

TEST_CASE("members that are not read are pointed out") {
  const Outcome<Table> outcome = read_json(R"({"extra": [1], "studies": [{"t": 1, "N1": 2}]})", "f");
  CHECK(outcome.ok());
  CHECK(messages(outcome) ==
        "f:1:2: caution: The member \"extra\" is not read. Studies stand in an array called \"studies\". "
        "[json-member]\n"
        "f:1:37: caution: The column \"N1\" is kept as a label, but it looks like \"n1\". Call it \"n1\" if "
        "it holds the "
        "size of group 1. [near-column]\n");
}

TEST_CASE("objects without common names are refused before they fill the memory") {
  std::string text = "[{\"t\":1";
  for (int i = 0; i < 900; ++i) text += ",\"x" + std::to_string(i) + "\":1";
  text += "}";
  for (int i = 0; i < 100'000; ++i) text += ",{\"t\":1}";
  text += "]";
  const Outcome<Table> outcome = read_json(text, "f");
  CHECK_FALSE(outcome.ok());
  REQUIRE(outcome.diagnostics.size() == 1);
  CHECK(outcome.diagnostics[0].code == "json-too-sparse");
  CHECK(outcome.diagnostics[0].what ==
        "The objects have 901 different names between them and hardly any in common.");

  std::string many = "[{\"t\":1";
  for (int i = 0; i < 1200; ++i) many += ",\"x" + std::to_string(i) + "\":1";
  CHECK(to_text(read_json(many + "}]", "f").diagnostics.at(0)) ==
        "f:1:8890: error: The objects have more than 1,000 different names. Check that every object is one "
        "study. "
        "[too-many-columns]");
}
