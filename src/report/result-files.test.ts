import { type Schema, Validator } from "@cfworker/json-schema";
import { describe, expect, it } from "vitest";
import dataPackageSchema from "../../docs/schemas/datapackage.schema.json" with { type: "json" };
import summarySchema from "../../docs/schemas/summary-1.schema.json" with { type: "json" };
import { emptyScene, exampleTrial, nothingSwims, withoutScale } from "../../tests/helpers/example-trial.ts";
import type { MeasuredTrial } from "../quantities/index.ts";
import { resultFiles } from "./index.ts";

const filesOf = (measured: MeasuredTrial) =>
  Object.fromEntries(resultFiles(measured).map(({ name, bytes }) => [name, new TextDecoder().decode(bytes)]));

/** Reads CSV letter by letter, as RFC 4180 describes it. */
function readCsv(text: string): string[][] {
  const rows: string[][] = [];
  let row: string[] = [];
  let cell = "";
  let quoted = false;
  for (let i = 0; i < text.length; i++) {
    const c = text[i]!;
    if (quoted) {
      if (c !== '"') cell += c;
      else if (text[i + 1] === '"') cell += text[i++]!;
      else quoted = false;
    } else if (c === '"') quoted = true;
    else if (c === "," || c === "\n") {
      row.push(cell);
      cell = "";
      if (c === "\n") rows.push(row);
      if (c === "\n") row = [];
    } else cell += c;
  }
  expect([cell, row, quoted]).toEqual(["", [], false]);
  return rows;
}

const variants = {
  exampleTrial: exampleTrial(),
  withoutScale: withoutScale(),
  nothingSwims: nothingSwims(),
  emptyScene: emptyScene(),
};

describe.each(Object.entries(variants))("files of %s", (_, measured) => {
  const files = filesOf(measured);

  it("are all there, in order", () => {
    expect(Object.keys(files)).toEqual([
      "paths.csv",
      "cells.csv",
      "turns.csv",
      "front.csv",
      "summary.json",
      "report.html",
      "datapackage.json",
    ]);
  });

  it("fit their schemas", () => {
    for (const [name, schema] of [
      ["summary.json", summarySchema],
      ["datapackage.json", dataPackageSchema],
    ] as const) {
      const validator = new Validator(JSON.parse(JSON.stringify(schema)) as Schema, "2020-12");
      expect(validator.validate(JSON.parse(files[name]!)).errors).toEqual([]);
    }
  });

  it("hold tables whose header, width and row count are what the data package and the measurement say", () => {
    const { resources } = JSON.parse(files["datapackage.json"]!);
    const rows = { paths: measured.paths.frame.length, cells: measured.paths.count, turns: 0, front: 0 };
    for (const { name, path, bytes, schema } of resources) {
      const text = files[path]!;
      const [header, ...body] = readCsv(text);
      expect(header).toEqual(schema.fields.map((field: { name: string }) => field.name));
      expect(body).toHaveLength(rows[name as keyof typeof rows]);
      expect(bytes).toBe(new TextEncoder().encode(text).length);
      for (const row of body) {
        expect(row).toHaveLength(header!.length);
        for (const [i, { type, constraints }] of schema.fields.entries()) {
          if (row[i] === "") expect(constraints?.required).toBeUndefined();
          else if (type === "integer") expect(row[i]).toMatch(/^\d+$/);
          else if (type === "number") expect(row[i]).toMatch(/^-?\d+\.\d+$/);
          else if (type === "boolean") expect(row[i]).toMatch(/^(true|false)$/);
          else if (constraints?.enum) expect(constraints.enum).toContain(row[i]);
        }
      }
    }
  });

  it("never hold NaN, Infinity, undefined or [object", () => {
    for (const text of Object.values(files)) expect(text).not.toMatch(/\bNaN\b|Infinity|\bundefined\b|\[object /);
  });

  it("are the same bytes when made again", () => {
    expect(filesOf(measured)).toEqual(files);
  });

  it("have a report that stands alone", () => {
    const page = files["report.html"]!;
    expect(page.length).toBeLessThan(1_000_000);
    expect(page).toContain("default-src &#39;none&#39;");
    expect(page).not.toMatch(/<script|<link|<iframe|\son\w+=|style="/i);
    for (const [, address] of page.matchAll(/(?:src|href|action)="([^"]*)"/g)) {
      expect(address).toMatch(/^data:image\/png;base64,/);
    }
    expect(page).not.toMatch(/url\(|@import/);
  });
});

describe("paths.csv", () => {
  it("has picture pixels with the shake in, micrometres with y up and the shake out", () => {
    const measured = exampleTrial();
    const [header, ...rows] = readCsv(filesOf(measured)["paths.csv"]!);
    expect(header).toEqual(["cell", "frame", "t_s", "x_px", "y_px", "x_um", "y_um"]);
    const row = 137;
    const { paths, shift, scale } = measured;
    const frame = paths.frame[row]!;
    expect(rows[row]!.slice(1)).toEqual([
      String(frame),
      paths.t_s[row]!.toFixed(6),
      (paths.x_px[row]! + shift.x_px[frame]!).toFixed(3),
      (paths.y_px[row]! + shift.y_px[frame]!).toFixed(3),
      (paths.x_px[row]! * scale!.um_per_px).toFixed(4),
      (-paths.y_px[row]! * scale!.um_per_px).toFixed(4),
    ]);
    expect(Math.abs(shift.x_px[frame]!)).toBeGreaterThan(0.01);
  });
});

describe("without a scale", () => {
  const files = filesOf(withoutScale());
  it("leaves every figure in micrometres empty or null, and has pixels beside", () => {
    for (const name of ["paths.csv", "cells.csv"]) {
      const [header, ...rows] = readCsv(files[name]!);
      for (const [i, column] of header!.entries()) {
        if (column.includes("_um")) expect(rows.every((row) => row[i] === "")).toBe(true);
        if (column === "speed_px_s") expect(rows.some((row) => Number(row[i]) > 0)).toBe(true);
      }
    }
    const { scale, speed, drift } = JSON.parse(files["summary.json"]!);
    expect(scale).toBeNull();
    for (const block of [speed, drift]) {
      for (const [name, value] of Object.entries(block)) if (name.includes("_um")) expect(value).toBeNull();
    }
    expect(speed.mean_px_s).toBeGreaterThan(0);
    expect(drift.velocity_px_s).toEqual([3.1, -1.4]);
    expect(files["report.html"]).toContain("px/s</b> on average");
    expect(files["report.html"]).not.toContain("µm/s");
  });
});

describe("what a measurement may not hold", () => {
  const example = exampleTrial();
  it.each([
    ["a NaN in a table", { cells: example.cells.map((cell) => ({ ...cell, straightness: Number.NaN })) }],
    ["an infinity in a figure", { speed: { ...example.speed!, sd_px_s: Number.POSITIVE_INFINITY } }],
    ["a typed array in the settings", { settings: { times: new Float64Array(2) } }],
    ["a NaN in the settings", { settings: { threshold: Number.NaN } }],
    ["two checks of one name", { quality: [example.quality[0]!, example.quality[0]!] }],
    ["a check sum that is none", { source: { ...example.source, sha256: "abc" } }],
    ["a share above 1", { speed: { ...example.speed!, motile_fraction: 1.2 } }],
  ])("is refused: %s", (_, changes) => {
    expect(() => resultFiles(exampleTrial(changes))).toThrow();
  });
});

describe("hostile text", () => {
  const script = `<script>alert("x")</script>`;
  const formula = `=HYPERLINK("http://x.example","a"),\n2`;
  const files = filesOf(
    exampleTrial({
      trial: script,
      strain: `${formula}<img src=x onerror=alert(1)>`,
      condition: "</title></style><script>1</script>",
      settings: { note: "</pre><script>1</script>" },
      warnings: [{ code: "x", message: `<b onclick="1">` }],
      cells: exampleTrial().cells.map((cell, i) => ({
        ...cell,
        reason: [formula, "+1", "-1", "@a", "\t=1", "\r=1", "a=1"][i % 7]!,
      })),
    }),
  );

  it("stays text in the report", () => {
    const page = files["report.html"]!;
    expect(page).not.toMatch(/<script|<img|<b onclick/);
    expect(page).toContain("&lt;script&gt;alert(&quot;x&quot;)&lt;/script&gt;");
    expect(page.match(/<\/style>/g)).toHaveLength(1);
    expect(page.match(/<\/pre>/g)).toHaveLength(1);
  });

  it("can't run in a spreadsheet, and comes back whole otherwise", () => {
    const [header, ...rows] = readCsv(files["cells.csv"]!);
    const reasons = rows.slice(0, 7).map((row) => row[header!.indexOf("reason")]);
    expect(reasons).toEqual([`'${formula}`, "'+1", "'-1", "'@a", "'\t=1", "'\r=1", "a=1"]);
  });

  it("is kept as it is in the summary, and makes a lawful package name", () => {
    const { trial, strain } = JSON.parse(files["summary.json"]!);
    expect(trial).toBe(script);
    expect(strain).toContain(formula);
    expect(JSON.parse(files["datapackage.json"]!).name).toBe("script-alert-x-script");
  });
});
