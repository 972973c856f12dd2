// Every check of the project, one after another. The last line says how many passed and failed.
import { spawnSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";

const root = fileURLToPath(new URL("..", import.meta.url));
const bin = (name) => join(root, "node_modules", ".bin", name);
const scratch = mkdtempSync(join(tmpdir(), "lodewake-tests-"));
const report = join(scratch, "vitest.json");

let passed = 0;
let failed = 0;

/** Runs a program; true when it ended well. */
function run(program, args) {
  const { status, error } = spawnSync(program, args, { cwd: root, stdio: "inherit" });
  if (error) console.error(error.message);
  return status === 0;
}

function check(name, ...commands) {
  console.log(`\n== ${name}`);
  const good = commands.every(([program, ...args]) => run(program, args));
  if (good) passed++;
  else failed++;
  console.log(`${name}: ${good ? "passed" : "FAILED"}`);
  return good;
}

check(
  "types",
  ...["src/tsconfig.pure.json", "src/tsconfig.browser.json", "src/tsconfig.node.json", "tests/tsconfig.json"].map(
    (project) => [bin("tsc"), "--noEmit", "-p", project],
  ),
);
check("format and lint", [bin("biome"), "check", "--error-on-warnings"]);
check("kernels rebuild to the same bytes", [process.execPath, "src/vision/kernels/build.mjs", "--check"]);
check(
  "build",
  [bin("vite"), "build", "--logLevel", "warn", "-c", "src/app/vite.config.ts"],
  [bin("vite"), "build", "--logLevel", "warn", "-c", "src/cli/vite.config.ts"],
);

console.log("\n== tests");
const ended = run(bin("vitest"), ["run", "--reporter=default", "--reporter=json", `--outputFile.json=${report}`]);
try {
  const { numPassedTests, numTotalTests, testResults } = JSON.parse(readFileSync(report, "utf8"));
  // A file that can't even be loaded holds no test, but has failed all the same.
  const unloaded = testResults.filter((file) => file.status === "failed" && file.assertionResults.length === 0).length;
  const notPassed = testResults.flatMap((file) => file.assertionResults).filter((t) => t.status !== "passed").length;
  passed += numPassedTests;
  failed += notPassed + unloaded;
  if (!ended && notPassed + unloaded === 0) failed++;
  if (numTotalTests === 0) failed++;
} catch (error) {
  console.error(`the tests left no report: ${error.message}`);
  failed++;
}
rmSync(scratch, { recursive: true, force: true });

console.log(`\n${passed} passed, ${failed} failed`);
process.exitCode = failed > 0 ? 1 : 0;
