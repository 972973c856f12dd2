import { describe, expect, it } from "vitest";
import { bytesOfFile, ownImports, projectFiles, shippedSources, textOfFile } from "./source-files.ts";

const files = projectFiles();
const text = (path: string) => textOfFile(path);
/** A source file without its comments, which may speak of what the code must not do. */
const code = (path: string) => text(path).replace(/\/\*[\s\S]*?\*\/|(?<![:"'`])\/\/.*$/gm, "");

describe("the house", () => {
  it("has no file that is about too much", () => {
    const long = files
      .filter((path) => /\.(tsx?|mjs|css|html|md|json)$/.test(path) && !/^fixtures\/|^package-lock/.test(path))
      .filter((path) => text(path).split("\n").length > 500);
    expect(long).toEqual([]);
  });

  it("names no machine and no registry", () => {
    const own = "tests/house/house.test.ts";
    const wrong = /registry\.npmjs|registry\.yarnpkg|\/home\/\w|\/root\/\w|\/work\/\w|C:\\Users/;
    expect(files.filter((path) => path !== own && wrong.test(bytesOfFile(path)))).toEqual([]);
    expect(text("package-lock.json")).not.toContain('"resolved"');
  });

  it("speaks of nothing that a reader of the project can't look up: issues by number, folders beside it", () => {
    const wrong = /\bissues? #?\d|(?<![\w/."'])(?:\.\.\/)+shared\b/i;
    const readable = files.filter(
      (path) => /\.(tsx?|mjs|css|html|md|json)$/.test(path) && path !== "package-lock.json",
    );
    expect(readable.length).toBeGreaterThan(300);
    expect(readable.filter((path) => wrong.test(text(path)))).toEqual([]);
  });

  it("keeps clocks, chance, locale, consoles, Node and the page out of the code that measures", () => {
    const pure = /^src\/(quantities|statistics|assay|vision|tracking|analysis|trial|report|pipeline)\//;
    const readers = /^src\/footage\/(?!node\/|browser\/)/;
    const chance = /Date\.now|new Date\(|Math\.random|performance\.|console\.|toLocale|\bIntl\./;
    const machine = /\bprocess\.|["']node:|(?<![.\w])(navigator|localStorage)\b/;
    const page =
      /(?<![.\w])(document\.(create|query|getElement|body|title)|window\.(document|location|add|request|inner))/;
    const sources = shippedSources().filter((path) => pure.test(path) || readers.test(path));
    expect(sources.length).toBeGreaterThan(100);
    const all = [chance, machine, page];
    expect(sources.filter((path) => all.some((wrong) => wrong.test(code(path))))).toEqual([]);
  });

  it("has only what belongs at the top", () => {
    const top = new Set(files.map((path) => path.split("/")[0] as string).filter((name) => !name.startsWith(".")));
    const known = ["README.md", "DEVELOPERS.md", "LICENSE", "biome.json", "package-lock.json", "package.json"];
    known.push("tsconfig.json", "vitest.config.ts", "src", "workers", "tests", "fixtures", "docs");
    expect([...top].filter((name) => !known.includes(name))).toEqual([]);
  });

  it("names the licence of everything it ships with", () => {
    const { dependencies, optionalDependencies } = JSON.parse(text("package.json"));
    const rows = text("docs/third-party.md")
      .split("\n")
      .filter((line) => line.startsWith("|"))
      .map((line) => line.split("|").map((cell) => cell.trim()) as [string, string, string]);
    for (const name of Object.keys({ ...dependencies, ...optionalDependencies })) {
      const row = rows.find(([, packages]) => packages.split(/[\s,]+/).includes(name));
      expect(row?.[2], name).toContain(licenceOf(name));
    }
    expect(text("LICENSE")).toMatch(/^MIT License/);
  });

  it("names the licence of everything that stands under what it ships with", () => {
    const { packages } = JSON.parse(text("package-lock.json")) as { packages: Record<string, Locked> };
    const shipped = Object.entries(packages).filter(([path, { dev, optional }]) => path !== "" && !dev && !optional);
    expect(shipped.length).toBeGreaterThan(50);
    const notices = text("docs/third-party.md");
    const licences = new Set(shipped.flatMap(([, { license }]) => (license ?? "none stated").split(/ AND | OR |[()]/)));
    expect([...licences].filter((licence) => !notices.includes(licence))).toEqual([]);
  });

  it("says only commands that exist", () => {
    const { scripts } = JSON.parse(text("package.json"));
    const commands = files.flatMap((path) => /^src\/cli\/commands\/(\w+)\.ts$/.exec(path)?.[1] ?? []);
    const said: string[] = [];
    for (const path of ["README.md", "DEVELOPERS.md", "fixtures/README.md"]) {
      for (const [, name] of text(path).matchAll(/npm run (?:-s )?([\w:]+)/g)) {
        expect(scripts, path).toHaveProperty([name as string]);
      }
      for (const [, name] of text(path).matchAll(/lodewake -- (\w+)/g)) {
        expect(commands, path).toContain(name);
        said.push(name as string);
      }
      for (const [, name] of text(path).matchAll(/(?<![\w/])(\.ci\/\w+)/g)) expect(files, path).toContain(name);
    }
    expect(said).toContain("measure");
  });

  it("checks files with the schemas it publishes, not with copies", () => {
    const imported = new Set(ownImports(shippedSources()).map(({ to }) => to));
    const schemas = files.filter((path) => /^docs\/schemas\/.*\.json$/.test(path));
    expect(schemas.length).toBeGreaterThanOrEqual(3);
    expect(schemas.filter((path) => !imported.has(path))).toEqual([]);
    expect(files.filter((path) => /schema[^/]*\.json$/.test(path))).toEqual(schemas);
  });
});

interface Locked {
  readonly license?: string;
  readonly dev?: boolean;
  readonly optional?: boolean;
}

/** The licence that an installed package states. */
const licenceOf = (name: string): string => JSON.parse(text(`node_modules/${name}/package.json`)).license;
