import { execFileSync } from "node:child_process";
import { readFileSync, statSync } from "node:fs";
import { dirname, join, normalize } from "node:path";
import { fileURLToPath } from "node:url";

const root = fileURLToPath(new URL("../..", import.meta.url));

/** Paths of all files of the project, tracked or about to be, with `/` between folders. */
export function projectFiles(): string[] {
  const listed = execFileSync("git", ["ls-files", "--cached", "--others", "--exclude-standard"], { cwd: root });
  return listed
    .toString()
    .trim()
    .split("\n")
    .filter((path) => statSync(join(root, path), { throwIfNoEntry: false })?.isFile());
}

/** The bytes of a project file as text, a character a byte. */
export const bytesOfFile = (path: string): string => readFileSync(join(root, path), "latin1");

/** The text of a project file. */
export const textOfFile = (path: string): string => readFileSync(join(root, path), "utf8");

/** One file of ours importing another, types included. */
export interface Import {
  readonly from: string;
  readonly to: string;
}

const specifier = /(?:^|[\s;}])(?:import|export)\b[^"';]*?from\s*["']([^"']+)["']|import\s*\(?\s*["']([^"']+)["']/g;

/** Every import of one of our own source files by another. */
export function ownImports(paths: readonly string[]): Import[] {
  return paths.flatMap((from) =>
    [...textOfFile(from).matchAll(specifier)].flatMap((match) => {
      const target = (match[1] ?? match[2]) as string;
      if (!target.startsWith(".")) return [];
      return [
        {
          from,
          to: normalize(join(dirname(from), target))
            .replaceAll("\\", "/")
            .replace(/\?.*$/, ""),
        },
      ];
    }),
  );
}

/** Source files that are shipped: TypeScript in src and workers without tests. */
export function shippedSources(): string[] {
  return projectFiles().filter(
    (path) => /^(src|workers)\/.*\.tsx?$/.test(path) && !/\.test\.tsx?$|kernels\/assembly\/|vite\.config/.test(path),
  );
}

/** Unit tests that stand beside the code. */
export const besideTests = (): string[] =>
  projectFiles().filter((path) => /^(src|workers)\/.*\.test\.tsx?$/.test(path));
