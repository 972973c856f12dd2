import { readdirSync, readFileSync } from "node:fs";
import { resolve } from "node:path";
import type { Plugin } from "vite";

interface Package {
  readonly name: string;
  readonly version: string;
  readonly license?: string;
  readonly homepage?: string;
}

/** Texts of licences that a package goes under without bringing them, by the package's name. */
const textsOfOurs: Readonly<Record<string, string>> = { "@ffmpeg/core": "docs/licences/GPL-2.0.txt" };

/**
 * Puts `licences.txt` beside the built page: the licence texts and notices of every package that code of the page or of
 * its workers came from, each text once. Workers are bundled apart from the page, so they need the second plugin.
 */
export function licencesBesidePage(project: string): { readonly page: Plugin; readonly worker: () => Plugin } {
  const packages = new Set<string>();
  const collect: Plugin["generateBundle"] = (_, bundle) => {
    for (const chunk of Object.values(bundle)) {
      if (chunk.type !== "chunk") continue;
      for (const id of chunk.moduleIds) {
        const folder = /^.*\/node_modules\/(?:@[^/]+\/)?[^/]+/.exec(id.replaceAll("\\", "/"))?.[0];
        if (folder) packages.add(folder);
      }
    }
  };
  return {
    worker: () => ({ name: "packages-in-workers", apply: "build", generateBundle: collect }),
    page: {
      name: "licences-beside-page",
      apply: "build",
      generateBundle(options, bundle, isWrite) {
        collect.call(this, options, bundle, isWrite);
        const source = licencesOf([...packages].sort(), project);
        this.emitFile({ type: "asset", fileName: "licences.txt", source });
      },
    },
  };
}

function licencesOf(folders: readonly string[], project: string): string {
  const own = readFileSync(resolve(project, "LICENSE"), "utf8");
  const owners = new Map<string, string[]>([[own, ["Lodewake"]]]);
  for (const folder of folders) {
    const about = JSON.parse(readFileSync(`${folder}/package.json`, "utf8")) as Package;
    const title = `${about.name} ${about.version} (${about.license ?? "no licence stated"})`;
    for (const text of textsOf(folder, about, project)) owners.set(text, [...(owners.get(text) ?? []), title]);
  }
  const rule = "=".repeat(78);
  return [...owners]
    .map(([text, names]) => `${rule}\n${names.join("\n")}\n${rule}\n\n${text.replace(/^\s*\n/, "").trimEnd()}\n`)
    .join("\n\n");
}

function textsOf(folder: string, about: Package, project: string): string[] {
  const names = readdirSync(folder);
  const files = names.filter((name) => /^(licen[cs]e|notice|copying)/i.test(name));
  if (files.length > 0) return files.map((name) => readFileSync(`${folder}/${name}`, "utf8"));
  const ours = textsOfOurs[about.name];
  if (ours) return [readFileSync(resolve(project, ours), "utf8")];
  const readMe = names.find((name) => /^readme/i.test(name));
  const inReadMe = readMe && /^#+ licen[cs]e\b[\s\S]*/im.exec(readFileSync(`${folder}/${readMe}`, "utf8"))?.[0];
  return [inReadMe || `The package brings no licence text. Its source: ${about.homepage ?? about.name}`];
}
