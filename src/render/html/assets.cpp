#include "render/html/assets.hpp"

#include <cstdint>

#include "steelyard/render.hpp"

namespace steelyard::render::html {
namespace {

constexpr std::string_view page_style =
    R"css(:root{color-scheme:light dark;--paper:#fff;--ink:#1c2530;--soft:#525d6b;--rule:#d5d9e0;--wash:#f4f5f8;--mark:#7a1f4b;--pick:#f3e3ea}
@media screen and (prefers-color-scheme:dark){:root{--paper:#12161c;--ink:#e7eaf0;--soft:#aeb7c4;--rule:#2c343f;--wash:#1a2029;--mark:#f2a5c6;--pick:#3a2230}}
*{box-sizing:border-box}
body{margin:0;background:var(--paper);color:var(--ink);font:16px/1.5 "DejaVu Sans",Verdana,sans-serif;overflow-wrap:break-word}
main,header,footer{max-width:1440px;margin:0 auto;padding:0 20px}
header{padding-top:28px}
h1{font-size:1.05rem;font-weight:normal;color:var(--soft);margin:0 0 14px;overflow-wrap:anywhere}
.verdict{border-left:6px solid var(--mark);padding:2px 0 2px 16px;max-width:62rem}
.verdict p{margin:0 0 .6em}
.verdict .strong{font-size:1.2rem;line-height:1.4}
nav{margin:18px 0 0;font-size:.9rem}
nav a{margin-right:1em;display:inline-block;padding:4px 0}
a{color:var(--mark)}
a:focus-visible,button:focus-visible,input:focus-visible,.scroll:focus-visible{outline:3px solid var(--mark);outline-offset:2px}
section{padding:26px 0 6px;border-top:1px solid var(--rule);margin-top:22px}
h2{font-size:1.25rem;margin:0 0 12px}
p,li{max-width:62rem}
figure{margin:0 0 22px;max-width:760px}
#figure-forest{max-width:1000px}
figcaption{font-size:.85rem;color:var(--soft)}
.y-figure{max-width:100%;height:auto;display:block}
.only-wide .y-figure{width:100%}
.only-narrow{display:none}
.pair{display:grid;grid-template-columns:repeat(auto-fit,minmax(min(100%,600px),1fr));gap:10px 36px;align-items:start}
.scroll{overflow-x:auto;margin:0 0 20px}
table{border-collapse:collapse;font-size:.88rem}
caption{text-align:left;color:var(--soft);padding:0 0 6px;font-size:.85rem}
th,td{text-align:right;padding:5px 12px 5px 0;border-bottom:1px solid var(--rule);vertical-align:top;font-variant-numeric:tabular-nums}
th:first-child,td:first-child,td.words,th.words{text-align:left}
th{font-weight:bold}
th button{font:inherit;color:inherit;background:none;border:0;border-bottom:2px dotted var(--mark);padding:2px 0;cursor:pointer}
th[aria-sort=ascending] button::after{content:" \25B4"}
th[aria-sort=descending] button::after{content:" \25BE"}
td.words{min-width:9rem;max-width:24rem}
tr.picked td,tr.picked th{background:var(--pick)}
.y-row{cursor:default}
.y-row.picked text{text-decoration:underline}
pre{background:var(--wash);padding:12px 14px;overflow-x:auto;font:.9rem/1.5 "DejaVu Sans Mono",monospace;white-space:pre-wrap;overflow-wrap:anywhere}
#readout{position:sticky;bottom:0;background:var(--wash);border-top:2px solid var(--mark);padding:6px 12px;font-size:.88rem;min-height:2.3em;overflow-wrap:anywhere}
.slide{background:var(--wash);padding:10px 14px;margin:0 0 18px;max-width:46rem}
.slide input{width:100%;margin:8px 0}
[hidden]{display:none!important}
@media (max-width:640px){main,header,footer{padding:0 12px}header{padding-top:16px}.only-wide{display:none}.only-narrow{display:block}.only-narrow .y-figure{width:100%}.verdict .strong{font-size:1.05rem}}
@page{size:A4;margin:14mm}
@media print{:root{color-scheme:light}th button{border:0}body{font-size:9.5pt}main,header,footer{max-width:none;padding:0}nav,#readout,.slide{display:none!important}.only-wide{display:block}.only-narrow{display:none}
.scroll{overflow:visible}table{font-size:7pt;width:100%}th,td{padding:2px 5px 2px 0}td.words{min-width:0}tr,figure,.verdict{break-inside:avoid}thead{display:table-header-group}h2{break-after:avoid}
figure .y-figure{width:auto;max-width:100%;max-height:235mm}.pair{display:block}section{margin-top:10px;padding:12px 0 0}}
)css";

// Sorting, the readout of a study under the pointer, and the slider over widths whose values stand in the
// table.
constexpr std::string_view page_script = R"js("use strict";
(function () {
  var byId = function (id) { return document.getElementById(id); };
  var each = function (list, f) { Array.prototype.forEach.call(list, f); };

  each(document.querySelectorAll("table.sortable"), function (table) {
    var body = table.tBodies[0];
    each(table.tHead.rows[0].cells, function (head, column) {
      var button = document.createElement("button");
      button.type = "button";
      button.textContent = head.textContent;
      head.textContent = "";
      head.appendChild(button);
      button.addEventListener("click", function () {
        var up = head.getAttribute("aria-sort") !== "ascending";
        each(table.tHead.rows[0].cells, function (other) { other.removeAttribute("aria-sort"); });
        head.setAttribute("aria-sort", up ? "ascending" : "descending");
        var rows = Array.prototype.slice.call(body.rows);
        rows.sort(function (a, b) {
          var x = a.cells[column], y = b.cells[column];
          var p = x.getAttribute("data-value"), q = y.getAttribute("data-value");
          var order = p !== null && q !== null ? p - q
            : p !== null ? -1 : q !== null ? 1
            : x.textContent < y.textContent ? -1 : x.textContent > y.textContent ? 1 : 0;
          return (up ? order : -order) || a.getAttribute("data-study") - b.getAttribute("data-study");
        });
        rows.forEach(function (row) { body.appendChild(row); });
      });
    });
  });

  var readout = byId("readout"), marks = document.querySelectorAll("[data-study]");
  var say = function (study) {
    var row = null;
    each(marks, function (mark) {
      var same = mark.getAttribute("data-study") === study;
      mark.classList.toggle("picked", same);
      if (same && mark.tagName === "TR") row = mark;
    });
    if (!row) { return; }
    var heads = row.parentNode.parentNode.tHead.rows[0].cells, words = [];
    for (var i = 0; i < 9; i += 1) {
      words.push(i === 0 ? row.cells[i].textContent : heads[i].textContent + " " + row.cells[i].textContent);
    }
    readout.textContent = words.join("  ·  ");
    readout.hidden = false;
  };
  each(marks, function (mark) {
    mark.addEventListener("mouseenter", function () { say(mark.getAttribute("data-study")); });
    if (mark.tagName === "TR") {
      mark.addEventListener("focusin", function () { say(mark.getAttribute("data-study")); });
    }
  });

  var table = byId("widths"), slide = byId("slide");
  if (table && slide) {
    var rows = table.tBodies[0].rows, input = byId("slide-input"), output = byId("slide-output");
    input.max = rows.length - 1;
    input.value = slide.getAttribute("data-start");
    var show = function () {
      each(rows, function (row, i) { row.classList.toggle("picked", String(i) === input.value); });
      var cells = rows[input.value].cells;
      var text = table.tHead.rows[0].cells[0].textContent + " " + cells[0].textContent + ": " + cells[1].textContent +
        " (" + cells[2].textContent + " decibans)";
output.textContent = text;
      input.setAttribute("aria-valuetext", text);
    };
    input.addEventListener("input", show);
    slide.hidden = false;
    show();
  }
}());
)js";

std::uint32_t nibble(char c) { return static_cast<std::uint32_t>(c <= '9' ? c - '0' : c - 'a' + 10); }

/// Hexadecimal digits to base64.
std::string base64(const std::string& hex) {
  static constexpr std::string_view alphabet =
      "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/";
  std::string out;
  for (std::size_t at = 0; at < hex.size(); at += 6) {
    std::uint32_t bits = 0;
    for (std::size_t k = 0; k < 6; ++k) bits = bits << 4U | (at + k < hex.size() ? nibble(hex[at + k]) : 0U);
    const std::size_t digits = (hex.size() - at >= 6 ? 6 : hex.size() - at) / 2 + 1;
    for (std::size_t k = 0; k < 4; ++k) out += k < digits ? alphabet[bits >> (18 - 6 * k) & 63U] : '=';
  }
  return out;
}

}  // namespace

std::string style() { return steelyard::svg_stylesheet() + std::string(page_style); }
std::string_view script() { return page_script; }
std::string policy_hash(std::string_view text) { return "'sha256-" + base64(sha256(text)) + "'"; }

}  // namespace steelyard::render::html
