#!/usr/bin/python3
"""Opens every sample figure and report in headless Chromium and in rsvg, and checks them by geometry.

check.py SAMPLES_PROGRAM    77 (skip) only when Chromium or rsvg-convert is not installed

Figures: they parse, no two texts overlap, no text leaves the frame, rsvg draws them.
Reports: hostile labels do not run, the report's own script does, an injected script is stopped by the
policy, nothing overflows at 360 and 1600 px, all content is there without JavaScript, text has
contrast AA, and they print.
"""
import html
import json
import os
import pathlib
import re
import shutil
import subprocess
import sys
import tempfile

CHROMIUM = shutil.which("chromium") or shutil.which("chromium-browser")
RSVG = shutil.which("rsvg-convert")
FLAGS = ["--headless", "--no-sandbox", "--disable-gpu", "--no-first-run", "--disable-background-networking",
         "--disable-component-update", "--disable-sync", "--allow-file-access-from-files"]

MEASURE = """
const result = {};
for (const [name, source] of Object.entries(samples)) {
  const problems = [];
  const parsed = new DOMParser().parseFromString(source, "image/svg+xml");
  if (parsed.querySelector("parsererror")) problems.push("does not parse: " + parsed.querySelector("parsererror").textContent);
  const holder = document.createElement("div");
  document.body.appendChild(holder);
  holder.appendChild(document.importNode(parsed.documentElement, true));
  const svg = holder.firstChild, frame = svg.getBoundingClientRect();
  const boxes = Array.from(svg.querySelectorAll("text")).map(t => [t.getBoundingClientRect(), t.lastChild ? t.lastChild.textContent : ""]);
  const slack = 1;
  boxes.forEach(([a, text], i) => {
    if (a.left < frame.left - slack || a.right > frame.right + slack || a.top < frame.top - slack || a.bottom > frame.bottom + slack)
      problems.push("outside the frame: " + text);
    boxes.slice(0, i).forEach(([b, other]) => {
      if (a.left + slack < b.right && b.left + slack < a.right && a.top + slack < b.bottom && b.top + slack < a.bottom)
        problems.push("overlap: " + other + " | " + text);
    });
  });
  if (!svg.querySelector("title") || !svg.querySelector("desc").textContent) problems.push("no title or description");
  if (boxes.length < 3) problems.push("hardly any text");
  result[name] = problems.slice(0, 3);
  holder.remove();
}
document.getElementById("result").textContent = JSON.stringify(result);
"""

LAYOUT = """
const result = {};
const frames = document.querySelectorAll("iframe");
window.addEventListener("load", () => {
  frames.forEach(frame => {
    const page = frame.contentDocument, problems = [], width = frame.clientWidth;
    if (page.documentElement.scrollWidth > width) problems.push("overflows: " + page.documentElement.scrollWidth + " px");
    page.querySelectorAll("p, h1, h2, li, figcaption, svg, .slide").forEach(e => {
      const box = e.getBoundingClientRect();
      if (box.width > 0 && box.right > width + 1) problems.push("leaves the page: " + e.tagName + " " + e.textContent.slice(0, 40));
    });
    const shown = Array.from(page.querySelectorAll("svg")).filter(s => s.getBoundingClientRect().width > 0);
    if (shown.length < 3) problems.push("figures are missing");
    const small = shown.filter(s => s.getBoundingClientRect().width / s.viewBox.baseVal.width < 0.95);
    if (small.length) problems.push("figures shrink below reading size: " + small.length);
    page.querySelectorAll("button, input, a, .scroll").forEach(e => {
      if (e.getBoundingClientRect().width > 0 && e.tabIndex < 0) problems.push("out of reach of the keyboard: " + e.tagName);
    });
    result[frame.name] = problems.slice(0, 4);
  });
  document.getElementById("result").textContent = JSON.stringify(result);
});
"""


def chromium(folder, *arguments):
    profile = tempfile.mkdtemp(dir=folder)
    done = subprocess.run([CHROMIUM, *FLAGS, f"--user-data-dir={profile}", *arguments], capture_output=True, timeout=300)
    return done.stdout.decode("utf-8", "replace")


def dom(folder, path, *arguments):
    return chromium(folder, "--virtual-time-budget=20000", "--dump-dom", *arguments, path.as_uri())


def result_of(text):
    found = re.search(r'<pre id="result">(.*?)</pre>', text, re.S)
    return json.loads(html.unescape(found.group(1))) if found and found.group(1) else {"page": ["no result"]}


def check_figures(folder, fail):
    samples = {p.name: p.read_text("utf-8") for p in sorted(folder.glob("*.svg"))}
    data = json.dumps(samples).replace("<", "\\u003c")
    page = folder / "measure.html"
    page.write_text(f'<!DOCTYPE html><meta charset="utf-8"><body><pre id="result"></pre><script>const samples = {data};{MEASURE}</script>',
                    "utf-8")
    measured = result_of(dom(folder, page))
    for name in samples:
        for problem in measured.get(name, ["was not measured"]):
            fail(f"{name}: {problem}")
        drawn = subprocess.run([RSVG, str(folder / name), "-o", str(folder / "out.png")], capture_output=True)
        if drawn.returncode != 0 or drawn.stderr.strip():
            fail(f"{name}: rsvg: {drawn.stderr.decode()[:200]}")
    return len(samples)


def title(text):
    found = re.search(r"<title>(.*?)</title>", text, re.S)
    return found.group(1) if found else ""


def check_policy(folder, fail):
    report = folder / "report-hostile.html"
    opened = dom(folder, report)
    if title(opened) == "run" or "<img" in opened:
        fail("a hostile label ran or became an element")
    if 'aria-valuetext="' not in opened or "<button" not in opened:
        fail("the report's own script did not run: its hash in the policy may be wrong")
    if "font:" in opened and "only-narrow" not in opened:
        fail("the style sheet is missing")
    injected = folder / "injected.html"
    source = report.read_text("utf-8")
    injected.write_text(source.replace("</main>", "<script>document.title='run'</script></main>"), "utf-8")
    if title(dom(folder, injected)) == "run":
        fail("the policy lets an injected script run")
    control = folder / "control.html"
    control.write_text(re.sub(r'<meta http-equiv="Content-Security-Policy"[^>]*>', "", injected.read_text("utf-8")), "utf-8")
    if title(dom(folder, control)) != "run":
        fail("the injected script does not run without the policy either, so the check above proves nothing")
    for outside in re.findall(r'(?:src|href)="([^"#][^"]*)"', source):
        fail(f"the report refers to something outside: {outside}")


def check_layout(folder, fail):
    frames = []
    for name in ("report-1.html", "report-12.html", "report-60.html", "report-hostile.html"):
        source = re.sub(r'<meta http-equiv="Content-Security-Policy"[^>]*>', "", (folder / name).read_text("utf-8"))
        for width in (360, 1600):
            frames.append(f'<iframe name="{name} at {width}" width="{width}" height="900" frameborder="0" srcdoc="{html.escape(source)}"></iframe>')
    page = folder / "layout.html"
    page.write_text(f'<!DOCTYPE html><meta charset="utf-8"><body><pre id="result"></pre>{"".join(frames)}<script>{LAYOUT}</script>', "utf-8")
    measured = result_of(dom(folder, page, "--window-size=1800,1200"))
    if len(measured) != len(frames):
        fail(f"only {len(measured)} of {len(frames)} pages were measured")
    for name, problems in measured.items():
        for problem in problems:
            fail(f"{name}: {problem}")


def luminance(colour):
    digits = colour.lstrip("#")
    digits = "".join(d + d for d in digits) if len(digits) == 3 else digits
    parts = [int(digits[i:i + 2], 16) / 255 for i in (0, 2, 4)]
    linear = [p / 12.92 if p <= 0.04045 else ((p + 0.055) / 1.055) ** 2.4 for p in parts]
    return 0.2126 * linear[0] + 0.7152 * linear[1] + 0.0722 * linear[2]


def contrast(a, b):
    low, high = sorted((luminance(a), luminance(b)))
    return (high + 0.05) / (low + 0.05)


def check_contrast(folder, fail):
    source = (folder / "report-12.html").read_text("utf-8")
    themes = re.findall(r":root\{color-scheme:light dark;([^}]*)\}", source) + re.findall(r"dark\)\{:root\{([^}]*)\}", source)
    if len(themes) != 2:
        fail("the light and the dark colours were not found")
    for theme in themes:
        colours = dict(re.findall(r"--(\w+):(#[0-9a-f]+)", theme))
        for text in ("ink", "soft", "mark"):
            for ground in ("paper", "wash", "pick"):
                if contrast(colours[text], colours[ground]) < 4.5:
                    fail(f"contrast of {text} on {ground} is {contrast(colours[text], colours[ground]):.1f}, AA asks for 4.5")
    style = re.search(r"<style>(.*?)</style>", source, re.S).group(1)
    light, dark = style.split("@media screen and (prefers-color-scheme:dark){", 1)
    for part, paper in ((light, "#ffffff"), (dark, "#12161c")):
        for role in ("ink", "soft"):
            colour = re.search(r"\.y-" + role + r"\{fill:(#\w+)", part).group(1)
            if contrast(colour, paper) < 4.5:
                fail(f"contrast of {role} in the figures is {contrast(colour, paper):.1f}, AA asks for 4.5")


def check_plain_and_print(folder, fail):
    for name in ("report-12.html", "report-60.html"):
        source = (folder / name).read_text("utf-8")
        without = re.sub(r"<script>.*?</script>", "", source, flags=re.S)
        for needed in ("Is there an effect?", "Does it vary?", 'id="study-table"', 'id="widths"', "Methods, ready to paste"):
            if needed not in without:
                fail(f"{name}: without JavaScript there is no {needed}")
        printed = folder / (name + ".pdf")
        chromium(folder, f"--print-to-pdf={printed}", "--no-pdf-header-footer", (folder / name).as_uri())
        if not printed.exists() or printed.stat().st_size < 20000:
            fail(f"{name}: does not print")


def main():
    if not CHROMIUM or not RSVG:
        print("skipped: chromium and rsvg-convert are needed (Debian packages chromium, librsvg2-bin)")
        return 77
    failures = []
    keep = os.environ.get("STEELYARD_KEEP")
    folder = pathlib.Path(keep or tempfile.mkdtemp(prefix="steelyard-browser-"))
    folder.mkdir(exist_ok=True)
    try:
        subprocess.run([sys.argv[1], str(folder)], check=True)
        figures = check_figures(folder, failures.append)
        for check in (check_policy, check_layout, check_contrast, check_plain_and_print):
            check(folder, failures.append)
    finally:
        if not keep:
            shutil.rmtree(folder, ignore_errors=True)
    for failure in failures:
        print("FAILED:", failure)
    print(f"{figures} figures and 4 reports opened, {len(failures)} problems")
    return 1 if failures else 0


if __name__ == "__main__":
    sys.exit(main())
