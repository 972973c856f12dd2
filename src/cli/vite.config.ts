import { fileURLToPath } from "node:url";
import { defineConfig } from "vite";

/** The command line as one bundle for Node. Libraries stay in node_modules and are loaded from there. */
export default defineConfig({
  root: fileURLToPath(new URL("../..", import.meta.url)),
  publicDir: false,
  build: {
    ssr: true,
    target: "node20",
    outDir: "dist/cli",
    emptyOutDir: true,
    minify: false,
    rollupOptions: {
      input: { main: fileURLToPath(new URL("./main.ts", import.meta.url)) },
      output: { entryFileNames: "[name].js", chunkFileNames: "[name].js" },
    },
  },
});
