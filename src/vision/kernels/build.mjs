// Compiles assembly/kernels.ts to WebAssembly and writes it, base64-coded, to kernels.wasm.ts, so that browser and Node
// load the same bytes without a fetch. `--check` only compares, for the test that holds source and binary together.
import { readFile, writeFile } from "node:fs/promises";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import asc from "assemblyscript/asc";

const here = dirname(fileURLToPath(import.meta.url));
const { error, binary } = await compile();
if (error) throw error;

const text = `// Compiled from assembly/kernels.ts by build.mjs (npm run build:kernels). Not edited by hand.
export const kernelsBase64 =
  "${Buffer.from(binary).toString("base64")}";
`;
const target = join(here, "kernels.wasm.ts");
if (process.argv.includes("--check")) {
  if ((await readFile(target, "utf8")) !== text) {
    console.error("kernels.wasm.ts is not what assembly/kernels.ts compiles to; run npm run build:kernels");
    process.exit(1);
  }
} else {
  await writeFile(target, text);
}

async function compile() {
  let binary = null;
  const source = await readFile(join(here, "assembly/kernels.ts"), "utf8");
  const options =
    "kernels.ts -O3 --noAssert --runtime stub --enable simd --importMemory --initialMemory 1 --maximumMemory 16384 --outFile kernels.wasm";
  const { error, stderr } = await asc.main(options.split(" "), {
    readFile: (name) => (name === "kernels.ts" ? source : null),
    writeFile: (name, contents) => {
      if (name === "kernels.wasm") binary = contents;
    },
    listFiles: () => [],
  });
  if (error) console.error(stderr.toString());
  return { error, binary };
}
