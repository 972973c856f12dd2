import { dirname, join } from "node:path";
import { describe, expect, it } from "vitest";
import summarySchema from "../../docs/schemas/summary-1.schema.json" with { type: "json" };
import { judgeFootage } from "../../src/analysis/quality/index.ts";
import { resultFiles } from "../../src/report/index.ts";
import { readTrial } from "../../src/trial/index.ts";
import { exampleTrial } from "../helpers/example-trial.ts";
import { projectFiles, shippedSources, textOfFile } from "./source-files.ts";

const contract = textOfFile("docs/trial-contract.md");
const files = Object.fromEntries(
  resultFiles(exampleTrial()).map(({ name, bytes }) => [name, new TextDecoder().decode(bytes)]),
);

/** What stands between two marks of the contract, the marks left out. */
function between(start: string, end: string): string {
  const [, after] = contract.split(start) as [string, string?];
  expect(after, start).toBeDefined();
  return (after as string).split(end)[0] as string;
}

/** Rows of a Markdown table that begin with a name in backquotes: that name, and the last cell. */
const rowsOf = (table: string) =>
  [...table.matchAll(/^\| `([^`]+)` \|(?:.*\|)? ([^|]*) \|$/gm)].map(([, name, last]) => [name, last] as const);

const inBackquotes = (text: string) => [...text.matchAll(/`([^`]+)`/g)].map(([, name]) => name as string);

describe("the trial contract", () => {
  it("shows a trial.json that reads without a word, and so does the read-me", () => {
    for (const path of ["docs/trial-contract.md", "README.md"]) {
      const [, example] = /```json\n([\s\S]*?)```/.exec(textOfFile(path)) as unknown as [string, string];
      const { trial, warnings } = readTrial(example, path);
      expect(warnings).toEqual([]);
      expect(trial).toMatchObject({ trial: "T07", recording: "swim.mp4" });
    }
  });

  it("lists the files of a result, and the columns they begin with", () => {
    const listed = rowsOf(between("## Out: a result folder", "`summary.json`, "));
    expect(listed.map(([name]) => name).sort()).toEqual(Object.keys({ ...files, "summary.json": "" }).sort());
    const tables = listed.filter(([name]) => name?.endsWith(".csv"));
    expect(tables).toHaveLength(4);
    for (const [name, columns] of tables) {
      const header = (files[name as string] as string).split("\n")[0] as string;
      const begin = `${inBackquotes(columns as string)[0]},`;
      expect(`${header},`.slice(0, begin.length), name).toBe(begin);
    }
  });

  it("lists the blocks of summary.json: what is measured holds them, and the schema asks for the rest", () => {
    const blocks = between('"lodewake/summary@1"`:\n```\n', "```");
    const summary = JSON.parse(files["summary.json"] as string);
    const whole = [...blocks.matchAll(/(\w+)\s+\{([^}]*)\}/g)].filter(([, , inside]) => !inside?.includes("…"));
    expect(whole.map(([, name]) => name)).toEqual(
      "source tool scale speed alignment turns rotation drift front".split(" "),
    );
    for (const [, name, inside] of whole as unknown as [string, keyof typeof summarySchema.properties, string][]) {
      const fields = inside.replace(/: \[.*?\]/g, "").match(/\w+/g) as string[];
      const schema = summarySchema.properties[name] as { required: string[] };
      expect(schema.required, name).toEqual(expect.arrayContaining(fields));
      if (summary[name] !== null) expect(Object.keys(summary[name]), name).toEqual(expect.arrayContaining(fields));
    }
    for (const name of blocks.match(/^\w+/gm) as string[]) expect(summary).toHaveProperty(name);
  });

  it("lists every check of the footage, in order", () => {
    const none = new Float32Array();
    const checks = judgeFootage({
      times_s: new Float64Array(),
      repeatedFrames: 0,
      framesExpected: null,
      shift: null,
      gain: none,
      falseAlarmsPerFrame: null,
      litShare: 1,
      clippedShare: 0,
      spotSigma_px: null,
      minor_px: none,
      snr: none,
      neighbourDistance_px: null,
      pathDurations_s: [],
      typicalSpeed_px_s: null,
    });
    expect(rowsOf(between("| check | figure |", "- Numbers are rounded")).map(([name]) => name)).toEqual(
      checks.map(({ check }) => check),
    );
  });

  it("lists every code of a warning and no other", () => {
    const listed = inBackquotes(between("Codes of warnings.", "### Tables"));
    const given = shippedSources()
      .filter((path) => /^src\/(?!app|cli)/.test(path))
      .flatMap((path) => [...textOfFile(path).matchAll(/\bcode: "([\w-]+)"/g)].map(([, code]) => code));
    expect(listed.sort()).toEqual([...new Set(given)].sort());
  });
});

describe("what is written about the code", () => {
  const written = projectFiles().filter((path) => path.endsWith(".md"));

  it("links to what exists", () => {
    let links = 0;
    for (const path of written) {
      for (const [, target] of textOfFile(path).matchAll(/\]\((?!https?:|#)([^)#]+)(?:#[^)]*)?\)/g)) {
        const to = join(dirname(path), target as string).replace(/\/$/, "");
        expect(
          projectFiles().some((file) => file === to || file.startsWith(`${to}/`)),
          `${path} links to ${target}`,
        ).toBe(true);
        links++;
      }
    }
    expect(links).toBeGreaterThan(3);
  });

  it("numbers the decisions without a gap, each with its context, choice and consequence", () => {
    const decisions = written.filter((path) => path.startsWith("docs/decisions/"));
    expect(decisions.length).toBeGreaterThan(10);
    for (const [i, path] of decisions.entries()) {
      const number = String(i + 1);
      expect(path).toMatch(new RegExp(`^docs/decisions/${number.padStart(4, "0")}-[\\w-]+\\.md$`));
      expect(textOfFile(path), path).toMatch(
        new RegExp(`^# ${number}\\. .+\\n\\n## Context\\n[\\s\\S]+\\n## Choice\\n[\\s\\S]+\\n## Consequence\\n`),
      );
    }
  });
});
