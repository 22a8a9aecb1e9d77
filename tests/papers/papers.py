#!/usr/bin/env python3
# papers.py BUILD - reports of every demonstration as a reader meets them: LaTeX compiled, PDF
# rasterised, HTML opened in a browser.  What is not installed is skipped with a line that says so.
import html
import os
import re
import shutil
import subprocess
import sys
import tempfile

BUILD = os.path.abspath(sys.argv[1])
PROGRAM = os.path.join(BUILD, "beamhours")
ROOT = os.path.dirname(os.path.dirname(os.path.dirname(os.path.abspath(__file__))))
PLANS = sorted(f[:-5] for f in os.listdir(os.path.join(ROOT, "plans")) if f.endswith(".yaml"))
problems = []


def wrong(where, what):
    problems.append(where)
    print("not ok %s: %s" % (where, what))


def run(command, folder, seconds=120):
    return subprocess.run(command, cwd=folder, timeout=seconds, stdout=subprocess.PIPE,
                          stderr=subprocess.STDOUT, errors="replace")


def beamhours(folder, *words):
    done = subprocess.run([PROGRAM, *words], cwd=folder, stdout=subprocess.PIPE,
                          stderr=subprocess.PIPE)
    if done.returncode:
        wrong(" ".join(words), done.stderr.decode()[-300:])
    return done.stdout


def plan(name):
    return os.path.join(ROOT, "plans", name + ".yaml")


# --- LaTeX ---

def needed(text):
    """The lines of a preamble that a fragment asks for."""
    return re.findall(r"^% (\\(?:usepackage|DeclareSIUnit).*)$", text, re.M)


def fragments(folder, name):
    """A small document that reads the report and both tables as fragments."""
    beamhours(folder, "report", plan(name), "--fragment", "--output", "part.tex")
    for file, options in (("rows.tex", []), ("bins.tex", ["--bins"])):
        with open(os.path.join(folder, file), "wb") as out:
            out.write(beamhours(folder, "table", plan(name), "--format", "latex", *options))
    lines = []
    for file in ("part.tex", "rows.tex", "bins.tex"):
        with open(os.path.join(folder, file), encoding="utf-8") as text:
            lines += [line for line in needed(text.read()) if line not in lines]
    with open(os.path.join(folder, "small.tex"), "w", encoding="utf-8") as out:
        out.write("\\documentclass[a4paper]{article}\n" + "\n".join(lines)
                  + "\n\\usepackage[margin=20mm]{geometry}\n\\begin{document}\n"
                  + "".join("\\input{%s}\n" % f for f in ("part", "rows", "bins"))
                  + "\\end{document}\n")


def compile_tex(engine, folder, job, where):
    for _ in range(2):
        done = run([engine, "-interaction=nonstopmode", "-halt-on-error", job + ".tex"], folder)
        if done.returncode:
            wrong(where, done.stdout[-500:])
            return
    with open(os.path.join(folder, job + ".log"), errors="replace") as file:
        log = file.read()
    for sign in (r"undefined", r"Missing character", r"LaTeX Warning: (?!Font|Size)", r"Float too"):
        found = re.search(sign + r".*", log)
        if found:
            wrong(where, found.group(0))
    for found in re.finditer(r"Overfull \\hbox \(([0-9.]+)pt too wide\).*", log):
        if float(found.group(1)) > 1.0:
            wrong(where, found.group(0))
    look_at_pages(folder, job + ".pdf", where)


def latex():
    if not shutil.which("pdflatex"):
        print("skipped: no pdflatex, LaTeX is not compiled (texlive-latex-extra, texlive-science)")
        return
    for name in PLANS:
        with tempfile.TemporaryDirectory() as folder:
            beamhours(folder, "report", plan(name), "--output", "whole.tex")
            fragments(folder, name)
            compile_tex("pdflatex", folder, "whole", name + ".tex")
            compile_tex("pdflatex", folder, "small", name + " as fragments")
            if name == PLANS[0] and shutil.which("lualatex"):
                compile_tex("lualatex", folder, "whole", name + ".tex by lualatex")
    print("LaTeX: %d reports and their fragments compiled" % len(PLANS))


# --- pages ---

DOTS = 40  # an inch
MARGIN = 0.6  # [inch] of white that every page keeps; its foot may stand 0.35 above the edge
FOOT = 0.3


def pages(folder, file):
    """Wide, high and rows of grey bytes of each page."""
    run(["pdftoppm", "-gray", "-r", str(DOTS), file, "page"], folder)
    for image in sorted(f for f in os.listdir(folder) if re.match(r"page.*\.pgm$", f)):
        path = os.path.join(folder, image)
        with open(path, "rb") as data:
            head, size, _, dots = data.read().split(b"\n", 3)
        os.remove(path)
        assert head == b"P5"
        wide, high = (int(n) for n in size.split())
        yield wide, high, dots


def ink(wide, high, dots):
    """The edges of what is not white: left, right, top, bottom [dots]; None for an empty page."""
    rows = [y for y in range(high) if min(dots[y * wide:(y + 1) * wide]) < 200]
    columns = [x for x in range(wide) if min(dots[x::wide]) < 200]
    return (columns[0], wide - 1 - columns[-1], rows[0], high - 1 - rows[-1]) if rows else None


def look_at_pages(folder, file, where, size=None):
    if not shutil.which("pdftoppm"):
        return
    count = 0
    for wide, high, dots in pages(folder, file):
        count += 1
        edges = ink(wide, high, dots)
        if not edges:
            wrong(where, "page %d is empty" % count)
        elif min(edges[:3]) < MARGIN * DOTS or edges[3] < FOOT * DOTS:
            wrong(where, "page %d: ink in the margin, %s dots from the edges" % (count, edges))
        if size and (abs(wide - size[0] * DOTS) > 2 or abs(high - size[1] * DOTS) > 2):
            wrong(where, "page %d is %d x %d dots" % (count, wide, high))
    if not count:
        wrong(where, "no page")
    fonts = run(["pdffonts", file], folder).stdout.splitlines()[2:]
    for font in fonts:
        if font.split()[-5] != "yes":
            wrong(where, "a font is not embedded: " + font)
    if not fonts:
        wrong(where, "no fonts")


def pdf():
    if not shutil.which("pdftoppm"):
        print("skipped: no pdftoppm, pages are not looked at (poppler-utils)")
        return
    for name in PLANS:
        for paper, size in (("a4", (8.27, 11.69)), ("letter", (8.5, 11.0))):
            with tempfile.TemporaryDirectory() as folder:
                beamhours(folder, "report", plan(name), "--paper", paper, "--output", "r.pdf")
                look_at_pages(folder, "r.pdf", "%s.pdf, %s" % (name, paper), size)
    print("PDF: %d reports looked at, A4 and letter" % len(PLANS))


# --- HTML ---

WIDTHS = (1280, 390)  # [px] of a window on a table, and on a telephone
BROWSERS = ("chromium", "chromium-browser", "google-chrome")
FLAGS = ["--headless", "--no-sandbox", "--disable-gpu", "--disable-quic", "--no-first-run",
         "--disable-background-networking", "--disable-component-update", "--disable-sync",
         "--hide-scrollbars", "--enable-logging=stderr", "--v=0"]
# Whatever the page would fetch is refused, and the refusal is an error on the console.
NOTHING = ("<meta http-equiv=\"Content-Security-Policy\" content=\"default-src 'none'; "
           "style-src 'unsafe-inline'; script-src 'unsafe-inline'; img-src data:\"/>")
# Clicks on every heading twice: rising, then falling; blanks and dashes stand last when rising.
CLICKS = """
var bad=[],clicks=0;
document.querySelectorAll('table').forEach(function(t,n){
 var count=t.tBodies[0].rows.length;
 Array.from(t.tHead.rows[0].cells).forEach(function(h,c){
  ['ascending','descending'].forEach(function(way){
   h.querySelector('button').click(); clicks++;
   var cells=Array.from(t.tBodies[0].rows).map(function(r){return r.cells[c].dataset.sort||r.cells[c].textContent;});
   if(cells.length!==count)bad.push('table '+(n+1)+' lost rows');
   if(h.getAttribute('aria-sort')!==way)bad.push('table '+(n+1)+' is not '+way);
   if(way==='descending')cells.reverse();
   if(h.className==='n'){
    cells=cells.map(parseFloat).filter(function(x){return !isNaN(x);});
    for(var i=1;i<cells.length;i++)if(cells[i]<cells[i-1])bad.push('table '+(n+1)+' column '+c);
   }else for(var k=1;k<cells.length;k++)
    if(cells[k-1].localeCompare(cells[k],undefined,{numeric:true})>0)bad.push('table '+(n+1)+' column '+c);
  });
 });
});
if(performance.getEntriesByType('resource').length)bad.push('something was fetched');
document.title='clicked '+clicks+'; '+(bad.join('; ')||'fine');
"""
# Each page inside a frame of either width; what is wide scrolls by itself, the page does not.
FRAMES = """<!DOCTYPE html><meta charset="utf-8"><title>wait</title>%s<script>
onload=function(){document.title=Array.from(document.querySelectorAll('iframe')).map(
function(f){var d=f.contentDocument;
return f.title+'|'+(Math.max(d.documentElement.scrollWidth,d.body.scrollWidth)-f.clientWidth)
+'|'+d.title;}).join('\\n');};
</script>"""


def frame(folder, name, width):
    path = os.path.join(folder, name + ".html")
    if not os.path.exists(path):
        beamhours(folder, "report", plan(name), "--output", path)
    with open(path, encoding="utf-8") as file:
        page = file.read()
    page = page.replace("<head>", "<head>" + NOTHING, 1)
    page = page.replace("</body>", "<script>" + CLICKS + "</script></body>")
    return ("<iframe title=\"%s, %d wide\" width=\"%d\" height=\"800\" style=\"border:0\" "
            "srcdoc=\"%s\"></iframe>" % (name, width, width, html.escape(page)))


def pages_of_html():
    browser = next((b for b in BROWSERS if shutil.which(b)), None)
    if not browser:
        print("skipped: no browser, HTML is not opened (chromium)")
        return
    with tempfile.TemporaryDirectory() as folder:
        with open(os.path.join(folder, "all.html"), "w", encoding="utf-8") as file:
            file.write(FRAMES % "".join(frame(folder, n, w) for n in PLANS for w in WIDTHS))
        done = subprocess.run([browser, *FLAGS, "--user-data-dir=" + folder + "/profile",
                               "--dump-dom", "file://" + folder + "/all.html"], timeout=300,
                              stdout=subprocess.PIPE, stderr=subprocess.PIPE)
    for line in done.stderr.decode(errors="replace").splitlines():
        if ":CONSOLE" in line:
            wrong("HTML", line)
    title = re.search(r"<title>(.*?)</title>", done.stdout.decode(errors="replace"), re.S)
    said = html.unescape(title.group(1)).splitlines() if title else []
    for line in said:
        where, wider, clicked = (line + "||").split("|")[:3]
        if wider != "0":
            wrong(where, "the page is %s px wider than its window" % wider)
        if not re.match(r"clicked [1-9][0-9]+; fine$", clicked):
            wrong(where, clicked)
    if len(said) != len(PLANS) * len(WIDTHS):
        wrong("HTML", "%d pages have been opened: %s" % (len(said), done.stderr[-300:]))
    print("HTML: %d pages opened, every heading clicked" % len(said))


PARTS = {"latex": latex, "pdf": pdf, "html": pages_of_html}
for part in sys.argv[2:] or PARTS:
    PARTS[part]()
sys.exit(1 if problems else 0)
