// CSV into tables: what is legal, what is refused, word for word.
#include <catch2/catch.hpp>

#include <string>

#include "read/helpers.hpp"
#include "steelyard/read.hpp"

using namespace steelyard;
using test::cells_of;
using test::messages;

namespace {

struct Legal {
  const char* what;
  std::string text;
  std::string cells;
};

struct Refused {
  const char* what;
  std::string text;
  std::string messages;
};

const std::string head = "study,t,n1,n2\n";

}  // namespace

TEST_CASE("legal CSV") {
  const Legal cases[] = {
      {"plain", head + "A,2.10,20,21\n", "line 2 study=A@2:1 t=2.10@2:3 n1=20@2:8 n2=21@2:11"},
      {"no line end at the end", head + "A,2.10,20,21", "line 2 study=A@2:1 t=2.10@2:3 n1=20@2:8 n2=21@2:11"},
      {"CRLF", "study,t\r\nA,1\r\nB,2\r\n", "line 2 study=A@2:1 t=1@2:3 | line 3 study=B@3:1 t=2@3:3"},
      {"CR alone", "study,t\rA,1\rB,2\r", "line 2 study=A@2:1 t=1@2:3 | line 3 study=B@3:1 t=2@3:3"},
      {"byte order mark", "\xEF\xBB\xBFstudy,t\nA,1\n", "line 2 study=A@2:1 t=1@2:3"},
      {"semicolons", "study;t;p\nA;2.1;.04\n", "line 2 study=A@2:1 t=2.1@2:3 p=.04@2:7"},
      {"semicolons and decimal commas", "study;t;p\nA;2,1;,04\n", "line 2 study=A@2:1 t=2,1@2:3 p=,04@2:7"},
      {"tabs", "study\tt\nA\t2,1\n", "line 2 study=A@2:1 t=2,1@2:3"},
      {"named separator", "sep=;\r\nstudy;t\r\nA;1\r\n", "line 3 study=A@3:1 t=1@3:3"},
      {"a comma in a semicolon header", "\"study\";\"a, b, c, d\";t\nA;x;1\n",
       "line 2 study=A@2:1 a, b, c, d=x@2:3 t=1@2:5"},
      {"quotes", "study,t\n\"A \"\"new\"\", really\",\"2.1\"\n",
       "line 2 study=A \"new\", really@2:2 t=2.1@2:22"},
      {"only quotes", "study,t\n\"\"\"\",1\n", "line 2 study=\"@2:2 t=1@2:6"},
      {"line end in quotes", "study,t\n\"A\nB\",1\nC,2\n",
       "line 2 study=A\nB@2:2 t=1@3:4 | line 4 study=C@4:1 t=2@4:3"},
      {"outer blanks", "study , t\n  A B  ,  2.1 \n", "line 2 study=A B@2:3 t=2.1@2:11"},
      {"columns count characters", "study,t\nMüller–Łódź,2.1\n", "line 2 study=Müller–Łódź@2:1 t=2.1@2:13"},
      {"blank lines", "\n\nstudy,t\n\nA,1\n\n\nB,2\n\n",
       "line 5 study=A@5:1 t=1@5:3 | line 8 study=B@8:1 t=2@8:3"},
      {"rows of empty cells", "study,t\n,\nA,1\n,\n", "line 3 study=A@3:1 t=1@3:3"},
      {"empty columns without a name", "study,t,,\nA,1,,\n", "line 2 study=A@2:1 t=1@2:3"},
      {"remarks before the header", "# invented\n# data\nstudy,t\n#1,1\n", "line 4 study=#1@4:1 t=1@4:4"},
      {"one column", "t\n1\n2\n", "line 2 t=1@2:1 | line 3 t=2@3:1"},
      {"labels of the user's own", "study,t,country\nA,1,\"Côte d'Ivoire\"\n",
       "line 2 study=A@2:1 t=1@2:3 country=Côte d'Ivoire@2:6"},
      {"choices in one spelling", "study,t,design,role,sign,reverse\nA,1,One Sample,Original,−,YES\n",
       "line 2 study=A@2:1 t=1@2:3 design=one_sample@2:5 role=original@2:16 sign=-@2:25 reverse=yes@2:27"},
      {"a level in percent", "study,ci_level\nA,95%\n", "line 2 study=A@2:1 ci_level=95%@2:3"},
  };
  for (const Legal& c : cases) {
    INFO(c.what);
    const Outcome<Table> outcome = read_table(c.text, "f.csv");
    CHECK(messages(outcome) == "");
    REQUIRE(outcome.ok());
    CHECK(cells_of(*outcome.value) == c.cells);
    CHECK(outcome.value->file == "f.csv");
    for (const Row& row : outcome.value->rows) CHECK(row.cells.size() == outcome.value->names.size());
  }
}

TEST_CASE("numbers of a CSV file are read") {
  const Outcome<Table> outcome = read_csv("study,t,n1,p\nA,2.10,30,<.05\n", "f.csv");
  REQUIRE(outcome.ok());
  const Table& table = *outcome.value;
  const Row& row = table.rows[0];
  CHECK(table.cell(row, "t")->printed.low == 2.095);
  CHECK(table.cell(row, "n1")->printed.relation == Relation::exact);  // 30 people are not 29.5 to 30.5
  CHECK(table.cell(row, "n1")->printed.low == 30.0);
  CHECK(table.cell(row, "p")->printed.high == .05);
  CHECK(table.cell(row, "study")->text == "A");
  CHECK_FALSE(table.cell(row, "study")->printed.present());
  CHECK(table.cell(row, "n2") == nullptr);
  CHECK(table.index_of("p") == 3);
  CHECK(table.index_of("n2") == -1);
}

TEST_CASE("the decimal mark is found from the cells of the file") {
  const auto value = [](const std::string& text) {
    const Outcome<Table> outcome = read_csv(text, "f");
    INFO(messages(outcome));
    REQUIRE(outcome.ok());
    return outcome.value->cell(outcome.value->rows[0], "t")->printed.value;
  };
  CHECK(value("study;t\nA;1,234\nB;0,5\n") == 1.234);
  CHECK(value("study;t\nA;1,234\nB;<,05\n") == 1.234);
  CHECK(value("study;t\nA;1,234\nB;0,123\n") == 1.234);
  CHECK(value("study;t\nA;1,234\nB;1234,567\n") == 1.234);
  CHECK(value("study;t\nA;2.5\nB;3\n") == 2.5);
  CHECK(value("study;t;p\nA;2;.01..05\n") == 2.0);
}

TEST_CASE("CSV that can't be used, word for word") {
  const std::string accepted =
      "Accepted are 2.10, .05, −1.2, 1 234, 2.1e-3, and 12% for a p value; bounds like <.05, >.10, <1, "
      "2.1..2.4 and "
      "ns; =2.1! for an exact value; and an empty cell when nothing is printed. [not-a-number]\n";
  const std::string width =
      "Every row needs as many cells as the header, empty ones included. [ragged-row]\n";
  const Refused cases[] = {
      {"empty", "",
       "f.csv:1:1: error: The file is empty. It needs a header line that names the columns, and a line for "
       "each "
       "study. [empty-file]\n"},
      {"blank", " \n\t\n",
       "f.csv:1:1: error: The file is empty. It needs a header line that names the columns, and a line for "
       "each "
       "study. [empty-file]\n"},
      {"header only", head,
       "f.csv:1: error: The file has a header but no rows. Add a line for each study. [no-rows]\n"},
      {"no header", "A,2.10,20,21\nB,1.00,20,20\n",
       "f.csv:1:1: error: None of the columns is known: \"A\", \"2.10\", \"20\", \"21\". The first line must "
       "name the "
       "columns, for example study,t,n1,n2; docs/formats.md lists them. [no-known-column]\n"},
      {"column twice", "study,t,t\nA,1,2\n",
       "f.csv:1:9: error: The column \"t\" stands twice in the header, as columns 2 and 3. Rename or remove "
       "one of "
       "them. [duplicate-column]\n"},
      {"cells without a name", "study,t,\nA,1,x\n",
       "f.csv:1:9: error: Column 3 has cells but no name. Name it in the header, or empty it. "
       "[column-without-name]\n"},
      {"short row", head + "A,2.1,20\n",
       "f.csv:2:1: error: This row has 3 cells, but the header names 4 columns. " + width},
      {"one cell", head + "A\n",
       "f.csv:2:1: error: This row has 1 cell, but the header names 4 columns. " + width},
      {"long row", head + "A,2,1,20,20\n",
       "f.csv:2:1: error: This row has 5 cells, but the header names 4 columns. Put cells that contain the "
       "separator "
       "in quotes. Numbers with a decimal comma need \";\" or tabs between the columns. [ragged-row]\n"},
      {"long row with semicolons", "study;t\nA;1;2\n",
       "f.csv:2:1: error: This row has 3 cells, but the header names 2 columns. Put cells that contain the "
       "separator "
       "in quotes. [ragged-row]\n"},
      {"quote inside", head + "A \"b\",2,20,20\n",
       "f.csv:2:3: error: There is a quote inside a cell that does not begin with one. Put the whole cell in "
       "quotes and "
       "double the quotes in it, as in \"the \"\"new\"\" test\". [broken-quote]\n"},
      {"blank before a quote", head + "A, \"2\",20,20\n",
       "f.csv:2:4: error: There is a blank before the opening quote of this cell. Remove the blank. "
       "[broken-quote]\n"},
      {"text after a quote", head + "\"A\"b,2,20,20\n",
       "f.csv:2:4: error: After the closing quote of this cell comes \"b\" instead of \",\" or the end of "
       "the line. "
       "Double every quote inside the cell, and leave nothing after the closing quote. [broken-quote]\n"},
      {"text after a quote, tabs", "study\tt\n\"A\"b\t2\n",
       "f.csv:2:4: error: After the closing quote of this cell comes \"b\" instead of a tab or the end of "
       "the line. "
       "Double every quote inside the cell, and leave nothing after the closing quote. [broken-quote]\n"},
      {"quote never closed", head + "A,2,20,20\n\"B,2,20,20\nC,2,20,20\n",
       "f.csv:3:1: error: The quote that opens this cell is never closed. Close it, and double every quote "
       "inside the "
       "cell. [quote-not-closed]\n"},
      {"not UTF-8", head + "M\xFCller,2,20,20\n",
       "f.csv:2:2: error: The byte 0xFC here isn't UTF-8 text. Save the file again as UTF-8. [not-utf8]\n"},
      {"overlong UTF-8", head + "M\xC0\xAF,2,20,20\n",
       "f.csv:2:2: error: The byte 0xC0 here isn't UTF-8 text. Save the file again as UTF-8. [not-utf8]\n"},
      {"surrogate in UTF-8", head + "M\xED\xA0\x80,2,20,20\n",
       "f.csv:2:2: error: The byte 0xED here isn't UTF-8 text. Save the file again as UTF-8. [not-utf8]\n"},
      {"UTF-16", std::string("\xFF\xFEs\0t\0", 6),
       "f.csv:1:1: error: This file is UTF-16, not UTF-8. Save it again as \"CSV UTF-8\" or in a plain text "
       "editor as "
       "UTF-8. [not-utf8]\n"},
      {"zero byte", head + std::string("A,2\0,20,20\n", 11),
       "f.csv:2:4: error: There is a zero byte here, so this isn't a text file. Save the table as CSV or "
       "JSON in UTF-8. "
       "[nul-byte]\n"},
      {"not a number", head + "A,x,20,20\n", "f.csv:2:3: error: \"x\" is not a number. " + accepted},
      {"NaN", head + "A,NaN,20,20\n",
       "f.csv:2:3: error: \"NaN\" is not a number that a paper prints. Leave the cell empty when nothing is "
       "printed. "
       "[not-finite]\n"},
      {"quoted decimal comma", head + "A,\"2,1\",20,20\n",
       "f.csv:2:4: error: \"2,1\" has a comma, but the decimal mark is the point here. Write it with a "
       "point; thousands "
       "are written with a blank or with nothing: 1 234 or 1234. [decimal-comma]\n"},
      {"ambiguous", "study;t\nA;1,234\n",
       "f.csv:2:3: error: \"1,234\" can be read with a decimal comma or with a comma between thousands, and "
       "no other "
       "number of this file tells which. Write it with a decimal point, or without the comma. "
       "[ambiguous-comma]\n"},
      {"comma of thousands beside points", "study;t\nA;1,234\nB;2.5\n",
       "f.csv:2:3: error: \"1,234\" has a comma, but the decimal mark is the point here. Write it with a "
       "point; "
       "thousands are written with a blank or with nothing: 1 234 or 1234. [decimal-comma]\n"},
      {"two decimal marks", "study;t\nA;1,5\nB;2,5\nC;3.5\n",
       "f.csv:4:3: error: \"3.5\" has a point, but the decimal mark is the comma here. Use one decimal mark "
       "in the "
       "whole file; thousands are written with a blank or with nothing: 1 234 or 1234. [decimal-point]\n"},
      {"fractional n", head + "A,2,20.5,20\n",
       "f.csv:2:5: error: \"20.5\" is not a whole number, but the column \"n1\" counts people. Write a whole "
       "number, 0 "
       "or more, or leave the cell empty. [not-a-count]\n"},
      {"negative n", head + "A,2,20,-1\n",
       "f.csv:2:8: error: \"-1\" is negative, but the column \"n2\" counts people. Write a whole number, 0 "
       "or more, or "
       "leave the cell empty. [not-a-count]\n"},
      {"n with a bound", head + "A,2,>20,20\n",
       "f.csv:2:5: error: \">20\" is not one number, but the column \"n1\" counts people. Write a whole "
       "number, 0 or "
       "more, or leave the cell empty. [not-a-count]\n"},
      {"year", "study,t,year\nA,2,1999a\n", "f.csv:2:5: error: \"1999a\" is not a number. " + accepted},
      {"fractional year", "study,t,year\nA,2,1999.5\n",
       "f.csv:2:5: error: \"1999.5\" is not a whole number, but the column \"year\" counts years. Write a "
       "whole number, "
       "0 or more, or leave the cell empty. [not-a-count]\n"},
      {"percent", "study,t\nA,2%\n",
       "f.csv:2:3: error: \"2%\" is a percentage, but the column \"t\" does not hold probabilities. Write "
       "the number "
       "itself. [percent-outside-p]\n"},
      {"choice", "study,t,design\nA,2,pared\n",
       "f.csv:2:5: error: \"pared\" is not a word that the column \"design\" knows; it takes \"two_groups\", "
       "\"one_sample\" or \"paired\". Did you mean \"paired\"? [unknown-choice]\n"},
      {"far choice", "study,t,sign\nA,2,positive\n",
       "f.csv:2:5: error: \"positive\" is not a word that the column \"sign\" knows; it takes \"+\" or "
       "\"-\". Use one of "
       "them, or leave the cell empty. [unknown-choice]\n"},
      {"all problems at once", head + "A,x,20,20\nB,2\n\"C\"c,2,1,1\nD,1,1,y\n",
       "f.csv:2:3: error: \"x\" is not a number. " + accepted +
           "f.csv:3:1: error: This row has 2 cells, but the header names 4 columns. " + width +
           "f.csv:4:4: error: After the closing quote of this cell comes \"c\" instead of \",\" or the end "
           "of the line. "
           "Double every quote inside the cell, and leave nothing after the closing quote. [broken-quote]\n"
           "f.csv:5:7: error: \"y\" is not a number. " +
           accepted},
      {"words without a statistic", "study,as_printed\nA,hello\n",
       "f.csv:2:3: error: No statistic was found in \"hello\". Copy the result as the paper prints it, for "
       "example: "
       "t(28) = 2.20, p = .036. [as-printed-nothing]\n"},
  };
  for (const Refused& c : cases) {
    INFO(c.what);
    const Outcome<Table> outcome = read_table(c.text, "f.csv");
    CHECK_FALSE(outcome.ok());
    CHECK(messages(outcome) == c.messages);
  }
}

TEST_CASE("a near miss among the column names is pointed out and kept") {
  const Outcome<Table> outcome = read_csv("study,t,N1,stduy\nA,2,20,x\n", "f.csv");
  REQUIRE(outcome.ok());
  CHECK(messages(outcome) ==
        "f.csv:1:9: caution: The column \"N1\" is kept as a label, but it looks like \"n1\". Call it \"n1\" "
        "if it holds "
        "the size of group 1. [near-column]\n"
        "f.csv:1:12: caution: The column \"stduy\" is kept as a label, but it looks like \"study\". Call it "
        "\"study\" if "
        "it holds the label of the study. [near-column]\n");
  CHECK(cells_of(*outcome.value) == "line 2 study=A@2:1 t=2@2:3 N1=20@2:5 stduy=x@2:8");
}

TEST_CASE("a hundred problems are listed, the others counted") {
  std::string text = head;
  for (int i = 0; i < 5000; ++i) text += "A,x,-1,1.5\n";
  const Outcome<Table> outcome = read_csv(text, "f.csv");
  REQUIRE(outcome.diagnostics.size() == 100);
  CHECK(to_text(outcome.diagnostics.back()) ==
        "f.csv: error: There are 14,901 more problems like these in this file. Mend the ones above first. "
        "[more-problems]");
  CHECK(outcome.diagnostics.front().where.line == 2);

  text = head;
  for (int i = 0; i < 100; ++i) text += "A,x,1,1\n";
  CHECK(read_csv(text, "f.csv").diagnostics.size() == 100);
  CHECK(read_csv(text, "f.csv").diagnostics.back().code == "not-a-number");
  CHECK(to_text(read_csv(text + "A,x,1\n", "f.csv").diagnostics.back()) ==
        "f.csv: error: There are 2 more problems like these in this file. Mend the ones above first. "
        "[more-problems]");
}

TEST_CASE("monstrous lines get a message") {
  const std::string much(std::size_t{2} << 20, 'a');
  CHECK(messages(read_csv(head + much + ",1,1,1\nA,x,1,1\n", "f.csv")).substr(0, 229) ==
        "f.csv:2:1: error: The line that begins here is longer than 1,048,576 bytes. No row of a table is "
        "that long: "
        "check that the file has line ends and that quotes are closed. [line-too-long]\n"
        "f.csv:3:3: error: \"x\" is not a number. Acce");
  CHECK(messages(read_csv(head + "A,1,1,1\n\"" + much + "\",1,1,1\n", "f.csv")) ==
        "f.csv:3:1: error: The quote that opens this cell is not closed within 1,048,576 bytes. Close it, "
        "and double "
        "every quote inside the cell. [quote-not-closed]\n");
  CHECK(messages(read_csv(std::string(std::size_t{2} << 20, ','), "f.csv")).substr(0, 50) ==
        "f.csv:1:1: error: The line that begins here is lon");
  CHECK(messages(read_csv("t" + std::string(2000, ',') + "\n", "f.csv")) ==
        "f.csv:1: error: The header names 2,001 columns; at most 1,000 are read. Check that the file is a "
        "table with "
        "one study a line. [too-many-columns]\n");
}

TEST_CASE("the paper's words stand in for empty cells") {
  const Outcome<Table> outcome = read_csv(
      "study,t,n,design,as_printed\n"
      "A,,,,\"t(28) = 2.20, p = .036\"\n"
      "B,2.5,,,\"t(28) = 2.20, N = 30\"\n"
      "C,,,paired,\"t(28) = 2.20, N = 29\"\n",
      "f.csv");
  CHECK(messages(outcome) == "");
  REQUIRE(outcome.ok());
  const Table& table = *outcome.value;
  const auto text = [&](std::size_t row, const char* name) {
    const Cell* cell = table.cell(table.rows[row], name);
    return cell == nullptr ? std::string("-") : cell->text;
  };
  CHECK(text(0, "t") == "2.20");
  CHECK(text(0, "df") == "28");
  CHECK(text(0, "p") == ".036");
  CHECK(table.cell(table.rows[0], "t")->line == 2);
  CHECK(table.cell(table.rows[0], "t")->column == 15);
  CHECK(table.own_cell(table.rows[0], "t") == nullptr);
  // Both say something: the row's own cell counts, and the words are kept for the audit.
  CHECK(text(1, "t") == "2.5");
  CHECK(Table::word_cell(table.rows[1], "t")->text == "2.20");
  CHECK(text(1, "n_total") == "30");
  CHECK(text(2, "n") == "29");
  CHECK(text(2, "n_total") == "-");
}
