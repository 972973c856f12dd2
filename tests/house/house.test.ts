import { describe, expect, it } from "vitest";
import { projectFiles, shippedSources, textOfFile } from "./source-files.ts";

const files = projectFiles();
const text = (path: string) => textOfFile(path);
const isText = (path: string) => /\.(tsx?|mjs|js|json|md|css|html|csv)$|^\.ci\/|^LICENSE$/.test(path);

describe("the house", () => {
  it("has no file that is about too much", () => {
    const long = files
      .filter((path) => /\.(tsx?|mjs|css|md)$/.test(path) && !path.endsWith("kernels.wasm.ts"))
      .filter((path) => text(path).split("\n").length > 500);
    expect(long).toEqual([]);
  });

  it("names no machine and no registry", () => {
    const own = "tests/house/house.test.ts";
    const wrong = /registry\.npmjs|registry\.yarnpkg|\/home\/\w|\/root\/\w|\/work\/\w|C:\\Users/;
    expect(files.filter((path) => path !== own && isText(path) && wrong.test(text(path)))).toEqual([]);
    expect(text("package-lock.json")).not.toContain('"resolved"');
  });

  it("keeps clocks, chance, locale and consoles out of the code that measures", () => {
    const pure = /^src\/(quantities|statistics|assay|vision|tracking|analysis|trial|report|pipeline)\//;
    const wrong = /Date\.now|new Date\(|Math\.random|performance\.now|console\.|toLocale|\bprocess\.|from "node:/;
    expect(shippedSources().filter((path) => pure.test(path) && wrong.test(text(path)))).toEqual([]);
  });

  it("has only what belongs at the top", () => {
    const top = new Set(files.map((path) => path.split("/")[0] as string).filter((name) => !name.startsWith(".")));
    const known = ["README.md", "DEVELOPERS.md", "LICENSE", "biome.json", "package-lock.json", "package.json"];
    known.push("tsconfig.json", "vitest.config.ts", "src", "workers", "tests", "fixtures", "docs");
    expect([...top].filter((name) => !known.includes(name))).toEqual([]);
  });

  it("names the licence of everything it ships with", () => {
    const { dependencies, optionalDependencies } = JSON.parse(text("package.json"));
    const { packages } = JSON.parse(text("package-lock.json"));
    const notices = text("docs/third-party.md");
    for (const name of Object.keys({ ...dependencies, ...optionalDependencies })) {
      const line = notices.split("\n").find((row) => row.startsWith("|") && row.includes(name));
      expect(line, name).toBeDefined();
      expect(line, name).toContain(packages[`node_modules/${name}`].license);
    }
    expect(text("LICENSE")).toMatch(/^MIT License/);
  });

  it("says only commands that exist", () => {
    const { scripts } = JSON.parse(text("package.json"));
    for (const path of ["README.md", "DEVELOPERS.md", "fixtures/README.md"]) {
      for (const [, name] of text(path).matchAll(/npm run (?:-s )?([\w:]+)/g))
        expect(scripts, path).toHaveProperty([name as string]);
      for (const [, name] of text(path).matchAll(/bash (\.ci\/\w+)/g)) expect(files, path).toContain(name);
    }
  });

  it("checks files with the schemas it publishes", () => {
    const used = shippedSources().map(text).join("\n");
    const schemas = files.filter((path) => /^docs\/schemas\/.*\.json$/.test(path));
    expect(schemas.length).toBeGreaterThanOrEqual(3);
    for (const path of schemas) expect(used).toContain(path);
  });
});
