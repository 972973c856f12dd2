import { describe, expect, it } from "vitest";
import { besideTests, type Import, ownImports, shippedSources, textOfFile } from "./source-files.ts";

/** What each part may import besides itself, by the table of docs/architecture.md. */
const mayImport: Readonly<Record<string, readonly string[]>> = Object.fromEntries(
  [...textOfFile("docs/architecture.md").matchAll(/^\| `(?:src\/)?([\w/]+)\/` \|.*\| ([^|]+) \|$/gm)].map(
    ([, part, list]) => [part, list === "nothing" ? [] : (list as string).split(", ")],
  ),
);

/** Folders that have a door of their own beside their parent's. */
const doors = [
  /^src\/footage\/(node|browser)\/index\.ts$/,
  /^src\/analysis\/\w+\/index\.ts$/,
  /^src\/cli\/encode\/index\.ts$/,
];

function partOf(path: string): string {
  if (path.startsWith("workers/")) return "workers";
  if (path.startsWith("tests/helpers/")) return "tests/helpers";
  const [, first, second] = path.split("/") as [string, string, string];
  return first === "analysis" ? `analysis/${second}` : first;
}

const sources = shippedSources();
const imports = ownImports(sources);
const isCode = ({ to }: Import) => /\.tsx?$/.test(to);
const code = imports.filter(isCode);
const measures = ["footage", "vision", "tracking", "analysis/motion", "analysis/quality", "pipeline", "report"];
const neverTrue = [...measures, "workers", "app"];

describe("the one direction", () => {
  it("looks at what there is", () => {
    expect(sources.length).toBeGreaterThan(150);
    expect(code.length).toBeGreaterThan(400);
    expect(Object.keys(mayImport).sort()).toEqual([...new Set(sources.map(partOf))].sort());
    expect(Object.values(mayImport).flat()).toEqual(expect.arrayContaining(["quantities", "pipeline"]));
    expect(Object.values(mayImport).flatMap((list) => list.filter((part) => !(part in mayImport)))).toEqual([]);
  });

  it("leads one way only: the table itself has no circle, and its faces don't know each other", () => {
    const table = Object.entries(mayImport).flatMap(([from, list]) => list.map((to) => ({ from, to })));
    expect(circleIn(table)).toBeNull();
    expect(Object.values(mayImport).flat()).not.toContain("app");
    expect(Object.values(mayImport).flat()).not.toContain("cli");
    expect(mayImport.quantities).toEqual([]);
  });

  it("no part imports what it may not", () => {
    const wrong = code.filter(
      ({ from, to }) => partOf(from) !== partOf(to) && !mayImport[partOf(from)]?.includes(partOf(to)),
    );
    expect(wrong.map(shown)).toEqual([]);
  });

  it("other parts are entered by their door", () => {
    expect(code.filter(goesRoundTheDoor).map(shown)).toEqual([]);
  });

  it("tests beside the code keep to it too, but for the tests' helpers and the synthetic assays", () => {
    const tests = ownImports(besideTests()).filter((one) => isCode(one) && partOf(one.to) !== "tests/helpers");
    expect(tests.length).toBeGreaterThan(100);
    const wrong = tests.filter(
      ({ from, to }) => ![partOf(from), "assay", ...(mayImport[partOf(from)] ?? [])].includes(partOf(to)),
    );
    expect([...wrong, ...tests.filter(goesRoundTheDoor)].map(shown)).toEqual([]);
  });

  it("what measures can't reach what knows the truth", () => {
    const reached = reachable(
      code,
      sources.filter((path) => neverTrue.includes(partOf(path))),
    );
    expect([...new Set([...reached].map(partOf))]).toEqual(expect.arrayContaining(neverTrue));
    expect([...reached].filter((path) => partOf(path) === "assay")).toEqual([]);
  });

  it("nothing imports itself in a circle", () => {
    expect(circleIn(code)).toBeNull();
  });
});

function goesRoundTheDoor({ from, to }: Import): boolean {
  if (partOf(from) === partOf(to)) return false;
  return !/^(src\/[\w-]+|workers)\/index\.ts$/.test(to) && !doors.some((door) => door.test(to));
}

const shown = ({ from, to }: Import) => `${from} imports ${to}`;

function reachable(edges: readonly Import[], from: readonly string[]): Set<string> {
  const seen = new Set(from);
  for (const path of seen) for (const edge of edges) if (edge.from === path) seen.add(edge.to);
  return seen;
}

/** One circle of imports, or null. */
function circleIn(edges: readonly Import[]): string[] | null {
  const next = groupByFrom(edges);
  const done = new Set<string>();
  const walk = (path: string, above: string[]): string[] | null => {
    if (above.includes(path)) return [...above.slice(above.indexOf(path)), path];
    if (done.has(path)) return null;
    for (const { to } of next.get(path) ?? []) {
      const found = walk(to, [...above, path]);
      if (found) return found;
    }
    done.add(path);
    return null;
  };
  for (const path of next.keys()) {
    const found = walk(path, []);
    if (found) return found;
  }
  return null;
}

function groupByFrom(edges: readonly Import[]): Map<string, Import[]> {
  const groups = new Map<string, Import[]>();
  for (const edge of edges) groups.set(edge.from, [...(groups.get(edge.from) ?? []), edge]);
  return groups;
}
