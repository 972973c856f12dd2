import { describe, expect, it } from "vitest";
import { seededRandom } from "../quantities/index.ts";
import { findJsonFault } from "./json-fault.ts";

describe("findJsonFault", () => {
  it.each([
    ["", 1, 1, "the file is empty"],
    ['{"a": 1', 1, 8, "the file ends before { is closed"],
    ['{"a": 1,\n}', 1, 8, "a comma stands after the last entry"],
    ["[1,\n 2,\n]", 2, 3, "a comma stands after the last entry"],
    ['{"a": 1\n "b": 2}', 2, 2, "a comma is missing before this"],
    ['{"a" 1}', 1, 6, "a colon is missing after the name"],
    ["{a: 1}", 1, 2, "this word must stand in double quotes"],
    ["{'a': 1}", 1, 2, 'text must stand in straight double quotes (")'],
    ['{"a": “b”}', 1, 7, 'text must stand in straight double quotes (")'],
    ['{"a": 1} // note', 1, 10, "JSON has no comments"],
    ['{"a": .5}', 1, 7, "this is not a number as JSON writes it (0.5, -3, 1e-6)"],
    ['{"a": 0,5}', 1, 9, "a name in double quotes is wanted here"],
    ['{"a": [1}', 1, 9, "} closes what [ opened"],
    ['{"a": "b\n"}', 1, 7, "this text is not closed on its line, or holds a lone backslash (write \\\\)"],
    ['{"a": "C:\\dir"}', 1, 7, "this text is not closed on its line, or holds a lone backslash (write \\\\)"],
    ["{} {}", 1, 4, "the description has ended, but more text follows"],
    ['{"a": NaN}', 1, 7, "this word must stand in double quotes"],
    ["{1: 2}", 1, 2, "a name in double quotes is wanted here"],
  ])("places the fault in %j", (text, line, column, what) => {
    expect(findJsonFault(text)).toEqual({ line, column, what });
  });

  it("agrees with the engine on what is JSON, over many mutilated documents", () => {
    const random = seededRandom(7);
    const alphabet = '{}[],:"\\/ \n\t0123456789.eE+-truefalsn\u0001é';
    const start = JSON.stringify({ a: [1, -2.5e-3, 'x\\"y', null], b: { c: true, d: "é\u2028" }, e: [] }, null, 1);
    let valid = 0;
    for (let trial = 0; trial < 20000; trial++) {
      let text = start;
      for (let edits = 1 + Math.floor(random() * 3); edits > 0; edits--) {
        const at = Math.floor(random() * text.length);
        const letter = random() < 0.4 ? "" : alphabet[Math.floor(random() * alphabet.length)]!;
        text = text.slice(0, at) + letter + text.slice(at + (random() < 0.5 ? 1 : 0));
      }
      let accepted = true;
      try {
        JSON.parse(text);
      } catch {
        accepted = false;
      }
      valid += Number(accepted);
      if ((findJsonFault(text) === null) !== accepted) expect.fail(`disagree on ${JSON.stringify(text)}`);
    }
    expect(valid).toBeGreaterThan(1000);
  });
});
