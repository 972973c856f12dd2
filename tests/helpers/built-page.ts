import { mkdtempSync, readFileSync, rmSync, statSync } from "node:fs";
import { createServer } from "node:http";
import type { AddressInfo } from "node:net";
import { tmpdir } from "node:os";
import { extname, join, normalize } from "node:path";
import { build } from "vite";

/** The policy the app is served with: nothing from elsewhere, nothing evaluated but WebAssembly. */
const policy =
  "default-src 'none'; script-src 'self' 'wasm-unsafe-eval'; worker-src 'self'; style-src 'self' 'unsafe-inline'; connect-src 'self'; img-src 'self' blob: data:";

const types: Readonly<Record<string, string>> = {
  ".html": "text/html; charset=utf-8",
  ".js": "text/javascript",
  ".css": "text/css",
  ".wasm": "application/wasm",
};

/** A page built with Vite and served, as the app is, under its strict policy. */
export interface BuiltPage {
  readonly url: string;
  close(): void;
}

/** Builds the page in the folder `root` and serves it on a free port of this machine. */
export async function servePage(root: string): Promise<BuiltPage> {
  const outDir = mkdtempSync(join(tmpdir(), "page-"));
  await build({
    root,
    base: "./",
    configFile: false,
    logLevel: "error",
    worker: { format: "es" },
    build: { outDir, emptyOutDir: true, target: "es2023", minify: false },
  });
  const server = createServer((request, response) => {
    const path = new URL(request.url ?? "/", "http://localhost").pathname;
    const file = join(outDir, normalize(path === "/" ? "/index.html" : path));
    const there = file.startsWith(outDir) && statSync(file, { throwIfNoEntry: false })?.isFile();
    response.writeHead(there ? 200 : 404, {
      "content-type": types[extname(file)] ?? "application/octet-stream",
      "content-security-policy": policy,
    });
    response.end(there ? readFileSync(file) : "");
  });
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  return {
    url: `http://127.0.0.1:${(server.address() as AddressInfo).port}/`,
    close() {
      server.close();
      server.closeAllConnections();
      rmSync(outDir, { recursive: true, force: true });
    },
  };
}
