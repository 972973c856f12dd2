import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { build } from "vite";
import { serveWorkbench } from "../../src/cli/serve.ts";

/** The workbench as it is shipped: built with its own configuration and served by its own server. */
export interface BuiltApp {
  readonly url: string;
  close(): Promise<void>;
}

/** Builds the workbench into a folder of its own and serves it. */
export async function serveBuiltApp(): Promise<BuiltApp> {
  const outDir = mkdtempSync(join(tmpdir(), "workbench-"));
  await build({
    configFile: fileURLToPath(new URL("../../src/app/vite.config.ts", import.meta.url)),
    logLevel: "error",
    build: { outDir },
  });
  const server = await serveWorkbench(outDir);
  return {
    url: server.url,
    async close() {
      await server.close();
      rmSync(outDir, { recursive: true, force: true });
    },
  };
}
