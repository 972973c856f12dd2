import { createReadStream } from "node:fs";
import { realpath, stat } from "node:fs/promises";
import { createServer, type IncomingMessage, type ServerResponse } from "node:http";
import type { AddressInfo } from "node:net";
import { extname, join, sep } from "node:path";
import { InputError } from "../quantities/index.ts";
import { byteRange } from "./byte-range.ts";

const policy =
  "default-src 'none'; script-src 'self' 'wasm-unsafe-eval'; worker-src 'self'; style-src 'self' 'unsafe-inline'; " +
  "connect-src 'self'; img-src 'self' blob: data:; media-src 'self' blob:; base-uri 'none'; form-action 'none'; " +
  "frame-ancestors 'none'";

const headers: Readonly<Record<string, string>> = {
  "Content-Security-Policy": policy,
  "Cross-Origin-Opener-Policy": "same-origin",
  "Cross-Origin-Embedder-Policy": "require-corp",
  "Cross-Origin-Resource-Policy": "same-origin",
  "X-Content-Type-Options": "nosniff",
  "Referrer-Policy": "no-referrer",
  "Cache-Control": "no-cache",
};

const types: Readonly<Record<string, string>> = {
  ".html": "text/html; charset=utf-8",
  ".js": "text/javascript; charset=utf-8",
  ".css": "text/css; charset=utf-8",
  ".json": "application/json; charset=utf-8",
  ".csv": "text/csv; charset=utf-8",
  ".txt": "text/plain; charset=utf-8",
  ".svg": "image/svg+xml",
  ".png": "image/png",
  ".wasm": "application/wasm",
  ".mp4": "video/mp4",
  ".mov": "video/quicktime",
  ".webm": "video/webm",
};

export interface ServeOptions {
  /** Port to listen on; any free one when left out. */
  readonly port?: number;
  /** A result folder to be served under `/results/`. */
  readonly results?: string;
}

/**
 * Serves the built workbench, and a result folder when there is one, to this machine only (127.0.0.1).
 *
 * @param root the folder the workbench was built into
 * @returns the address of the workbench, and what ends the serving
 * @throws InputError when a folder isn't there or the port is taken
 */
export async function serveWorkbench(
  root: string,
  options: ServeOptions = {},
): Promise<{ url: string; close(): Promise<void> }> {
  const page = await folderAt(root, "workbench-missing", "Build the workbench first: npm run build.");
  const results =
    options.results === undefined
      ? null
      : await folderAt(options.results, "results-missing", "Measure a trial into that folder first.");
  const server = createServer((request, response) => {
    answer(request, response, page, results).catch(() => {
      if (!response.headersSent) refuse(response, 500);
      response.destroy();
    });
  });
  await new Promise<void>((listening, failed) => {
    server.once("error", (error: NodeJS.ErrnoException) => failed(portError(error, options.port)));
    server.listen(options.port ?? 0, "127.0.0.1", listening);
  });
  return {
    url: `http://127.0.0.1:${(server.address() as AddressInfo).port}/`,
    close: () =>
      new Promise((closed) => {
        server.close(() => closed());
        server.closeAllConnections();
      }),
  };
}

async function folderAt(path: string, code: string, remedy: string): Promise<string> {
  const real = await realpath(path).catch(() => null);
  if (real !== null && (await stat(real)).isDirectory()) return real;
  throw new InputError(code, "There is no such folder.", path, remedy);
}

function portError(error: NodeJS.ErrnoException, port: number | undefined): Error {
  if (error.code !== "EADDRINUSE" && error.code !== "EACCES") return error;
  const what = error.code === "EACCES" ? "This port can't be listened on." : "Another program listens on this port.";
  return new InputError("port-taken", what, `port ${port}`, "Choose another port, or leave it out to get a free one.");
}

async function answer(
  request: IncomingMessage,
  response: ServerResponse,
  page: string,
  results: string | null,
): Promise<void> {
  // A page elsewhere may make its own name point here; it must not get to read what is served.
  if (!/^(127\.0\.0\.1|localhost)(:\d+)?$/.test(request.headers.host ?? "")) return refuse(response, 421);
  if (request.method !== "GET" && request.method !== "HEAD") return refuse(response, 405);
  const path = pathOf(request.url ?? "/");
  if (path === null) return refuse(response, 400);
  const inResults = results !== null && /^\/results(\/|$)/.test(path);
  if (inResults && path === "/results") return redirect(response, "/results/");
  const file = inResults ? await fileIn(results, path.slice(8), "report.html") : await fileIn(page, path, "index.html");
  if (file === null) return refuse(response, 404);
  send(request, response, file.path, file.size);
}

/** The path of a request without query; null when it can't be read. */
function pathOf(url: string): string | null {
  try {
    const path = decodeURIComponent(url.replace(/[?#].*$/, ""));
    return path.startsWith("/") && !path.includes("\0") ? path : null;
  } catch {
    return null;
  }
}

/** A file inside `folder`, links followed; null when there is none or it lies outside. */
async function fileIn(folder: string, path: string, index: string): Promise<{ path: string; size: number } | null> {
  const asked = join(folder, path.endsWith("/") ? path + index : path);
  const real = await realpath(asked).catch(() => null);
  if (real === null || !real.startsWith(folder + sep)) return null;
  const facts = await stat(real);
  return facts.isFile() ? { path: real, size: facts.size } : null;
}

function send(request: IncomingMessage, response: ServerResponse, path: string, size: number): void {
  const range = byteRange(request.headers.range, size);
  const own = {
    ...headers,
    "Content-Type": types[extname(path).toLowerCase()] ?? "application/octet-stream",
    "Accept-Ranges": "bytes",
  };
  if (range === "unsatisfiable") {
    response.writeHead(416, { ...own, "Content-Range": `bytes */${size}` }).end();
    return;
  }
  const [first, last] = range ?? [0, size - 1];
  response.writeHead(range ? 206 : 200, {
    ...own,
    "Content-Length": last - first + 1,
    ...(range ? { "Content-Range": `bytes ${first}-${last}/${size}` } : {}),
  });
  if (request.method === "HEAD" || size === 0) {
    response.end();
    return;
  }
  const stream = createReadStream(path, { start: first, end: last });
  stream.on("error", () => response.destroy());
  response.on("close", () => stream.destroy());
  stream.pipe(response);
}

function redirect(response: ServerResponse, to: string): void {
  response.writeHead(308, { ...headers, Location: to }).end();
}

function refuse(response: ServerResponse, status: number): void {
  const text = { 400: "Bad request", 404: "Not found", 405: "Method not allowed", 421: "Wrong host" }[status];
  response.writeHead(status, { ...headers, "Content-Type": "text/plain; charset=utf-8" }).end(`${text ?? "Failed"}\n`);
}
