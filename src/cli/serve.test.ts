import { mkdir, mkdtemp, rm, symlink, writeFile } from "node:fs/promises";
import { request } from "node:http";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { byteRange } from "./byte-range.ts";
import { serveWorkbench } from "./serve.ts";

let folder: string;
let server: Awaited<ReturnType<typeof serveWorkbench>>;

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), "lodewake-serve-"));
  await mkdir(join(folder, "app/assets"), { recursive: true });
  await mkdir(join(folder, "results"));
  await writeFile(join(folder, "app/index.html"), "<!doctype html>page");
  await writeFile(join(folder, "app/assets/core.wasm"), "0123456789");
  await writeFile(join(folder, "results/report.html"), "report");
  await writeFile(join(folder, "secret.txt"), "secret");
  await symlink(join(folder, "secret.txt"), join(folder, "app/link.txt"));
  server = await serveWorkbench(join(folder, "app"), { results: join(folder, "results") });
});
afterAll(async () => {
  await server.close();
  await rm(folder, { recursive: true });
});

/** Asks for a path exactly as written: fetch would tidy it up first. */
function ask(path: string, headers: Record<string, string> = {}, method = "GET") {
  return new Promise<{ status: number; headers: NodeJS.Dict<string | string[]>; body: string }>((done, failed) => {
    const asked = request(new URL(server.url), { path, headers, method }, (response) => {
      let body = "";
      response.on("data", (piece) => {
        body += piece;
      });
      response.on("end", () => done({ status: response.statusCode!, headers: response.headers, body }));
    });
    asked.on("error", failed);
    asked.end();
  });
}

describe("serveWorkbench", () => {
  it("serves page and results with their types", async () => {
    expect(server.url).toMatch(/^http:\/\/127\.0\.0\.1:\d+\/$/);
    expect(await ask("/")).toMatchObject({ status: 200, body: "<!doctype html>page" });
    expect((await ask("/assets/core.wasm")).headers["content-type"]).toBe("application/wasm");
    expect(await ask("/results/")).toMatchObject({ status: 200, body: "report" });
    expect((await ask("/results")).headers.location).toBe("/results/");
    expect((await ask("/none.js")).status).toBe(404);
  });

  it("holds the page to its own origin", async () => {
    const { headers } = await ask("/");
    const policy = String(headers["content-security-policy"]).split("; ");
    expect(policy).toContain("default-src 'none'");
    expect(policy).toContain("connect-src 'self'");
    expect(policy).toContain("frame-ancestors 'none'");
    expect(policy.join()).not.toMatch(/\*|https?:|'unsafe-eval'/);
    expect(headers["cross-origin-opener-policy"]).toBe("same-origin");
    expect(headers["cross-origin-embedder-policy"]).toBe("require-corp");
    expect((await ask("/none.js")).headers["content-security-policy"]).toBeDefined();
  });

  it("lets nobody out of the folder", async () => {
    for (const path of ["/../secret.txt", "/..%2fsecret.txt", "/assets/../../secret.txt", "/link.txt", "/%00", "/%"]) {
      const { status, body } = await ask(path);
      expect([path, status]).toEqual([path, path === "/%00" || path === "/%" ? 400 : 404]);
      expect(body).not.toContain("secret");
    }
  });

  it("answers under its own name only, and only to reading", async () => {
    expect((await ask("/", { host: "elsewhere.example" })).status).toBe(421);
    expect((await ask("/", {}, "POST")).status).toBe(405);
    expect(await ask("/", {}, "HEAD")).toMatchObject({ status: 200, body: "" });
  });

  it("serves parts of files", async () => {
    const part = await ask("/assets/core.wasm", { range: "bytes=2-4" });
    expect(part).toMatchObject({ status: 206, body: "234" });
    expect(part.headers["content-range"]).toBe("bytes 2-4/10");
    expect(await ask("/assets/core.wasm", { range: "bytes=99-" })).toMatchObject({ status: 416 });
  });

  it("says so when there is nothing to serve, or the port is taken", async () => {
    await expect(serveWorkbench(join(folder, "none"))).rejects.toMatchObject({ code: "workbench-missing" });
    const port = Number(new URL(server.url).port);
    await expect(serveWorkbench(join(folder, "app"), { port })).rejects.toMatchObject({ code: "port-taken" });
  });
});

describe("byteRange", () => {
  it("reads the three forms", () => {
    expect(byteRange("bytes=2-4", 10)).toEqual([2, 4]);
    expect(byteRange("bytes=7-", 10)).toEqual([7, 9]);
    expect(byteRange("bytes=-3", 10)).toEqual([7, 9]);
    expect(byteRange("bytes=2-99", 10)).toEqual([2, 9]);
    expect(byteRange("bytes=-99", 10)).toEqual([0, 9]);
  });

  it("ignores what it can't read and refuses what isn't there", () => {
    for (const header of [undefined, "bytes=-", "bytes=1-2,4-5", "rows=1-2", "bytes=4-2"]) {
      expect(byteRange(header, 10)).toBeNull();
    }
    expect(byteRange("bytes=10-", 10)).toBe("unsatisfiable");
    expect(byteRange("bytes=-0", 10)).toBe("unsatisfiable");
  });
});
