import { readFileSync } from "node:fs";
import { resolve } from "node:path";
import { fileURLToPath } from "node:url";
import react from "@vitejs/plugin-react";
import { defineConfig, type Plugin } from "vite";
import { licencesBesidePage } from "./licences-beside-page.ts";
import { pagePolicy } from "./policy.ts";

const here = fileURLToPath(new URL(".", import.meta.url));
const project = resolve(here, "../..");
const demo = resolve(project, "fixtures/demo-trial");
const licences = licencesBesidePage(project);

/** Puts the policy into the built page. The development server needs inline scripts and goes without. */
function policyInPage(): Plugin {
  return {
    name: "policy-in-page",
    apply: "build",
    transformIndexHtml: () => [
      {
        tag: "meta",
        attrs: { "http-equiv": "Content-Security-Policy", content: pagePolicy },
        injectTo: "head-prepend",
      },
    ],
  };
}

/** Puts the demo trial (its description and its recording) beside the built page. */
function demoBesidePage(): Plugin {
  return {
    name: "demo-beside-page",
    apply: "build",
    generateBundle() {
      const description = readFileSync(resolve(demo, "trial.json"));
      const { recording } = JSON.parse(description.toString()) as { recording: string };
      this.emitFile({ type: "asset", fileName: "demo/trial.json", source: description });
      this.emitFile({ type: "asset", fileName: `demo/${recording}`, source: readFileSync(resolve(demo, recording)) });
    },
  };
}

/** Modules of our own do nothing by being loaded; what isn't used of them need not be in the bundle. */
const moduleSideEffects = (id: string) =>
  id.endsWith(".css") || /main\.tsx|\.worker\.ts/.test(id) || !/\/src\//.test(id);

export default defineConfig({
  root: here,
  base: "./",
  plugins: [react(), policyInPage(), demoBesidePage(), licences.page],
  worker: { format: "es", plugins: () => [licences.worker()] },
  // Only what lies in the project is served while developing.
  server: { host: "127.0.0.1", fs: { allow: [project] } },
  build: {
    outDir: resolve(project, "dist/app"),
    emptyOutDir: true,
    target: "es2023",
    // Everything is fetched from our own origin; the policy allows no data addresses for code.
    assetsInlineLimit: 0,
    modulePreload: { polyfill: false },
    rolldownOptions: { treeshake: { moduleSideEffects } },
    chunkSizeWarningLimit: 900,
  },
});
