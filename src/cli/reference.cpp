#include "reference.hpp"

#include <fmt/format.h>

#include "manual.hpp"
#include "steelyard/json.hpp"

namespace steelyard::cli {

namespace {

constexpr std::string_view command_head = R"(# The command

`steelyard COMMAND [FILE] [OPTIONS]`. Without a FILE, or with `-`, standard input is read.

- Results go to standard output, everything else to standard error.
- `--json -` and `--svg -` write to standard output, and then nothing else does.
- An output file is written beside its target and takes its place when it is whole: an interrupted run leaves
  the old file as it was. A target that can't be written is reported before the work begins. Devices and pipes
  are written straight.
- Colour is used on a terminal only, and not when `NO_COLOR` is set. The width is that of the terminal, or
  `COLUMNS`; characters are ASCII when the locale is not UTF-8. Numbers have a decimal point in every locale.
- All problems of a file are reported at once, as `file:line:column: error: what is wrong and what to do
  [code]`; beyond 100 only their number.
- A reader that closes the pipe early (`| head`) ends the run quietly.
- What takes longer than a second says so on standard error, on a terminal.

This page is made from the same tables as `--help`, the man pages and the completions
(`steelyard_generate --docs docs`); a test compares them.

)";

constexpr std::string_view json_head = R"(# Results as JSON

`--json FILE` writes one object. Numbers are the shortest text that reads back to the same double; logarithms
are natural; what does not exist, is not identified or is not finite is null, with a reason beside it where
there is one. `schema` is the version of the fields: new fields may come, and when one changes its meaning or
goes away the number grows. The JSON Schemas (draft 2020-12) stand in `schema/`.

Every field is described once, in `src/render/json/`; the bytes, the schemas and this page are made from that
description (`steelyard_generate --docs docs`), and a test compares them. An object that occurs again (a
summary, a Bayes factor, a message) is spelled out where it occurs first.

)";

std::string json_page() {
  std::string text(json_head);
  for (const JsonDocument& document : json_documents()) {
    text += fmt::format("## `{}`: {}\n\n{}\n", document.name, document.title, json_fields(document.name));
  }
  text.pop_back();
  return text;
}

}  // namespace

std::vector<Page> reference_pages() {
  std::vector<Page> pages = {{"cli.md", std::string(command_head) + markdown_reference()},
                             {"json.md", json_page()}};
  for (const JsonDocument& document : json_documents()) {
    pages.push_back({fmt::format("schema/{}.schema.json", document.name), json_schema(document.name)});
  }
  return pages;
}

}  // namespace steelyard::cli
