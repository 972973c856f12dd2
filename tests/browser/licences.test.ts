import { readFileSync } from "node:fs";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { type BuiltApp, serveBuiltApp } from "../helpers/built-app.ts";

const notices = readFileSync(new URL("../../docs/third-party.md", import.meta.url), "utf8");
/** Packages of the notices' table of what is built: name, licence, version. */
const listed = [...(notices.split("## ")[1] as string).matchAll(/^\| (\S+) \| ([^|]+) \| (\d[\w.-]+) \|/gm)];

let app: BuiltApp;
let texts: string;
beforeAll(async () => {
  app = await serveBuiltApp();
  texts = await (await fetch(`${app.url}licences.txt`)).text();
});
afterAll(() => app.close());

describe("licences.txt beside the built page", () => {
  it("names what the notices name, with version and licence, and nothing else", () => {
    const named = [...texts.matchAll(/^((?:@[\w-]+\/)?[\w.-]+) (\d[\w.-]+) \((.*)\)$/gm)]
      .filter(([, name]) => !name?.startsWith("@stdlib/") || name.endsWith("t-quantile"))
      .map(([, name, version, licence]) => `${name} ${version} ${licence}`);
    expect(listed.length).toBeGreaterThan(20);
    expect([...new Set(named)].sort()).toEqual(
      listed
        .filter(([, name]) => name !== "d3")
        .map(([, name, licence, version]) => `${name} ${version} ${licence}`)
        .sort(),
    );
  });

  it("holds the texts that must travel", () => {
    const wanted = [
      "Lodewake authors",
      "GNU GENERAL PUBLIC LICENSE\n                       Version 2, June 1991",
      "Mozilla Public License Version 2.0",
      "Apache License\n                           Version 2.0, January 2004",
      "Copyright (c) 2016-2026 The Stdlib Authors.",
      "Mike Bostock",
      "Meta Platforms, Inc. and affiliates.",
    ];
    expect(wanted.filter((text) => !texts.includes(text))).toEqual([]);
    expect(texts.match(/brings no licence text/g)).toHaveLength(1);
  });
});
