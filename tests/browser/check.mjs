// node check.mjs FOLDER: every finding on the pages of FOLDER, printed on A4 and on Letter; exit 1 if there is one.
// Needs Chromium and pdftotext on the machine, and `npm ci --ignore-scripts` beside this file.
import fs from "node:fs";
import os from "node:os";
import path from "node:path";
import { execFileSync } from "node:child_process";
import { createRequire } from "node:module";
import { pathToFileURL } from "node:url";
import puppeteer from "puppeteer-core";

const MM = 96 / 25.4;
const POINT = 72 / 25.4;
const folder = process.argv[2];
const temp = fs.mkdtempSync(path.join(os.tmpdir(), "pages-"));
const axe = fs.readFileSync(createRequire(import.meta.url).resolve("axe-core/axe.min.js"), "utf8");
const keep = process.env.KEEP_PDF;

// Runs inside the page with print styles on and a window as wide as the safe area.
function layout(safeWidth) {
  const found = new Set();
  const mm = 96 / 25.4;
  const all = selector => [...document.querySelectorAll(selector)];
  const name = e => `${e.tagName.toLowerCase()} '${e.textContent.trim().slice(0, 40)}'`;

  for (const e of all("body *")) {
    if (e.closest("svg") && e.tagName !== "svg") continue;
    const style = getComputedStyle(e);
    const box = e.getBoundingClientRect();
    if (style.display === "none" || !box.width) continue;
    // The project line is cut on purpose after two lines; its whole text stands in the title.
    const cut = e.classList.contains("project");
    if (style.display !== "inline" && e.clientWidth && e.scrollWidth > e.clientWidth + 1 && !cut) found.add(`clipped: ${name(e)}`);
    if (box.right > safeWidth + 1) found.add(`wider than the safe area: ${name(e)}`);
    const words = [...e.childNodes].some(n => n.nodeType === 3 && n.data.trim());
    if (words && parseFloat(style.fontSize) < (9.4 * 96) / 72) found.add(`text too small: ${name(e)}`);
    if (words && e.tagName === "TD" && box.height > 60 * mm) found.add(`row higher than 60 mm: ${name(e)}`);
  }

  for (const svg of all("svg[viewBox]")) {
    const view = svg.viewBox.baseVal;
    const back = svg.getScreenCTM().inverse();
    const texts = [...svg.querySelectorAll("text")].filter(t => !t.closest("defs"));
    for (const t of texts) {
      const b = t.getBoundingClientRect();
      const low = new DOMPoint(b.left, b.top).matrixTransform(back);
      const high = new DOMPoint(b.right, b.bottom).matrixTransform(back);
      const inside = low.x >= view.x - 0.1 && low.y >= view.y - 0.1 && high.x <= view.x + view.width + 0.1 && high.y <= view.y + view.height + 0.1;
      if (!inside) found.add(`outside the drawing: ${name(t)}`);
      if (parseFloat(t.getAttribute("font-size")) < 2.9) found.add(`text too small: ${name(t)}`);
    }
    const level = texts.filter(t => Math.abs(t.getScreenCTM().b) < 1e-6);
    const boxes = level.map(t => t.getBoundingClientRect());
    for (let i = 0; i < boxes.length; i++) {
      for (let j = i + 1; j < boxes.length; j++) {
        const across = Math.min(boxes[i].right, boxes[j].right) - Math.max(boxes[i].left, boxes[j].left);
        const down = Math.min(boxes[i].bottom, boxes[j].bottom) - Math.max(boxes[i].top, boxes[j].top);
        if (across > 2 && down > 4) found.add(`texts overlap: ${name(level[i])} and ${name(level[j])}`);
      }
    }
  }

  const ids = all("[id]").map(e => e.id);
  for (const id of new Set(ids)) if (ids.indexOf(id) !== ids.lastIndexOf(id)) found.add(`id used twice: ${id}`);
  for (const e of all("svg, svg *")) {
    for (const a of e.attributes) {
      if (/\b(NaN|inf|Infinity|undefined)\b/.test(a.value) && !/label/.test(a.name)) found.add(`no number in ${e.tagName} ${a.name}`);
      for (const [, id] of a.value.matchAll(/url\(#([^)]+)\)/g)) if (!document.getElementById(id)) found.add(`no such id: ${id}`);
    }
  }
  for (const e of all("input[type=checkbox]")) {
    const b = e.getBoundingClientRect();
    if (Math.min(b.width, b.height) < 6 * mm - 0.5) found.add(`tick box under 6 mm: ${e.getAttribute("aria-label")}`);
  }
  return [...found];
}

// Tiny marks at the top and bottom of all that must stay whole, and two marks 100 mm apart.
function mark() {
  let n = 0;
  const names = {};
  const put = (host, where, text) => {
    const m = document.createElement("span");
    m.textContent = text;
    m.style.cssText = `position:absolute;${where};font:2pt/1 monospace;color:#000;white-space:pre`;
    if (getComputedStyle(host).position === "static") host.style.position = "relative";
    host.append(m);
  };
  for (const e of document.querySelectorAll("tbody tr, figure, .hold, h2, h3")) {
    const id = String(n++).padStart(4, "0");
    names[id] = `${e.tagName.toLowerCase()} '${e.textContent.trim().slice(0, 40)}'`;
    const ends = e.cells ? [e.cells[0], e.cells[e.cells.length - 1]] : [e, e];
    if (/^H[23]$/.test(e.tagName)) {
      // A heading belongs to what follows it: to the first row of a table, not to its repeated head.
      let next = e.nextElementSibling ?? e.parentElement.nextElementSibling;
      const row = next?.querySelector("tbody tr");
      ends[1] = next?.matches(".wide:has(tbody tr)") ? row.cells[0] : next;
      if (!ends[1]) continue;
      // In the flow, because a heading reserves room below itself and its box may begin a page early.
      const inline = document.createElement("span");
      inline.textContent = `Qa${id}`;
      inline.style.font = "2pt/1 monospace";
      e.prepend(inline);
      put(ends[1], "left:9mm;top:0", `Qz${id}`);
      continue;
    }
    put(ends[0], "left:0;top:0", `Qa${id}`);
    put(ends[1], "left:0;bottom:0", `Qz${id}`);
  }
  const head = document.querySelector(".head");
  put(head, "left:0;top:0", "Qruler0");
  put(head, "left:100mm;top:0", "Qruler1");
  return names;
}

function printed(pdf, { hash, sheet, landscape, names }) {
  const found = [];
  const at = {};
  const ruler = {};
  const text = execFileSync("pdftotext", ["-bbox", pdf, "-"], { maxBuffer: 1 << 28 }).toString();
  const pages = text.split("<page ").slice(1);
  pages.forEach((page, k) => {
    const [, w, h] = page.match(/width="([\d.]+)" height="([\d.]+)"/).map(Number);
    const edge = 5 * POINT;
    const words = [...page.matchAll(/xMin="([\d.-]+)" yMin="([\d.-]+)" xMax="([\d.-]+)" yMax="([\d.-]+)">([^<]*)</g)];
    if (landscape !== w > h) found.push(`page ${k + 1} lies the wrong way`);
    const whole = words.map(word => word[5]).join(" ");
    if (!/\bpage \d+ of \d+/.test(whole)) found.push(`no page number on page ${k + 1}`);
    if (!whole.includes(hash)) found.push(`no hash on page ${k + 1}`);
    if (!whole.includes("Check the hash before use")) found.push(`no foot on page ${k + 1}`);
    if (!words.some(word => word[5] === sheet)) found.push(`no sheet name on page ${k + 1}`);
    // Everything but the last page is used at least to its middle.
    const lowest = Math.max(...words.map(word => +word[4]).filter(y => y < h - 14 * POINT));
    if (k + 1 < pages.length && lowest < 0.45 * h) found.push(`page ${k + 1} is mostly blank`);
    if (words.length < 36) found.push(`page ${k + 1} is all but empty`);
    for (const [, x0, y0, x1, y1, word] of words) {
      if (+x0 < edge || +y0 < edge || +x1 > w - edge || +y1 > h - edge) found.push(`within 5 mm of the paper's edge: ${word}`);
      for (const [, end, id] of word.matchAll(/Q([az])(\d{4})/g)) (at[id] ??= {})[end] ??= k + 1;
      if (/^Qruler[01]$/.test(word)) ruler[word.at(-1)] ??= +x0;
    }
  });
  for (const [id, p] of Object.entries(at)) if (p.a !== p.z) found.push(`split over pages ${p.a} and ${p.z}: ${names[id]}`);
  if (!Object.keys(at).length && sheet !== "safety") found.push("no marks found");
  const scale = (ruler[1] - ruler[0]) / (100 * POINT);
  if (!(Math.abs(scale - 1) < 0.002)) found.push(`printed at ${(100 * scale).toFixed(1)} %`);
  if (sheet === "safety" && pages.length !== 1) found.push(`the safety sheet takes ${pages.length} pages`);
  return found;
}

const browser = await puppeteer.launch({
  executablePath: process.env.CHROMIUM || "/usr/bin/chromium",
  headless: true,
  protocolTimeout: 60000,
  args: ["--no-sandbox"],
});
let findings = 0;
const files = fs.readdirSync(folder).filter(f => f.endsWith(".html")).sort();
for (const file of files) {
  const say = (where, list) => {
    for (const text of list) {
      findings++;
      console.log(`${file}: ${where}: ${text}`);
    }
  };
  const page = await browser.newPage();
  const noise = [];
  page.on("request", r => /^(file|data|blob):/.test(r.url()) || noise.push(`asks for ${r.url()}`));
  page.on("pageerror", e => noise.push(e.message));
  page.on("console", m => m.type() === "error" && noise.push(m.text()));
  await page.goto(pathToFileURL(path.resolve(folder, file)).href);
  const landscape = (await page.$("body.landscape")) !== null;
  const hash = await page.$eval("main", e => e.dataset.hash);
  const sheet = await page.$eval(".rev b", e => e.textContent);

  await page.emulateMediaType("print");
  const safeWidth = (landscape ? 250 : 180) * MM;
  await page.setViewport({ width: Math.ceil(safeWidth), height: 900 });
  say("print", await page.evaluate(layout, safeWidth));
  const widest = await page.addStyleTag({ content: '*{font-family:"DejaVu Sans"!important}' });
  say("print, wide font", await page.evaluate(layout, safeWidth));
  await widest.evaluate(e => e.remove());

  await page.emulateMediaType("screen");
  await page.setViewport({ width: 360, height: 740, isMobile: true });
  const scroll = await page.evaluate(() => document.documentElement.scrollWidth);
  if (scroll > 360) say("phone", [`the page scrolls sideways, ${scroll} px`]);
  await page.setViewport({ width: 1000, height: 900 });
  await page.evaluate(axe);
  const { violations } = await page.evaluate(() => axe.run({ resultTypes: ["violations"] }));
  say("access", violations.map(v => `${v.id} (${v.impact}) ${v.nodes.length}x ${v.nodes[0].html.slice(0, 100)}`));

  // An emulated medium would rule the printed pages too.
  await page.emulateMediaType(null);
  for (const format of ["A4", "Letter"]) {
    if (keep) await page.pdf({ path: path.join(keep, `${file}.${format}.pdf`), format, printBackground: false });
  }
  const names = await page.evaluate(mark);
  for (const format of ["A4", "Letter"]) {
    const pdf = path.join(temp, `${file}.${format}.pdf`);
    await page.pdf({ path: pdf, format, printBackground: false });
    say(format, printed(pdf, { hash, sheet, landscape, names }));
  }
  say("page", noise);
  await page.close();
}
await browser.close();
fs.rmSync(temp, { recursive: true });
console.log(findings ? `${findings} findings` : `${files.length} pages clean`);
process.exitCode = findings || !files.length ? 1 : 0;
