import { describe, expect, it } from "vitest";
import { exampleTrial } from "../../tests/helpers/example-trial.ts";
import type { MeasuredTrial } from "../quantities/index.ts";
import { methodsText } from "./methods-text.ts";

const trial = exampleTrial();
const frames = trial.source.frames;
const still = { x_px: new Float32Array(frames), y_px: new Float32Array(frames) };
const shaken = { x_px: new Float32Array(frames), y_px: new Float32Array(frames).fill(0.5) };
const drift = (from: NonNullable<MeasuredTrial["drift"]>["from"]) =>
  ({ ...trial.drift, from }) as NonNullable<MeasuredTrial["drift"]>;

const written = (changes: Partial<MeasuredTrial>) => {
  const { paragraphs, references } = methodsText({ ...trial, ...changes });
  return { text: paragraphs.join("\n"), references };
};

describe("the methods text", () => {
  it.each<[string, Partial<MeasuredTrial>]>([
    ["steady, without flow", { shift: still, drift: null }],
    ["shaken, flow from turning swimmers", { shift: shaken, drift: drift("turning swimmers") }],
  ])("lists what it cites and nothing else, in order: %s", (_, changes) => {
    const { text, references } = written(changes);
    const cited = new Set([...text.matchAll(/[A-Z][a-z]+(?: and [A-Z][a-z]+| et al\.)? (?:19|20)\d\d/g)].map(String));
    expect(references.map(({ short }) => short)).toEqual([...cited].sort());
    for (const { short, full } of references) {
      expect(full).toContain(short.split(" ")[0]);
      expect(full).toContain(short.slice(-4));
    }
  });

  it("says of shake, flow and scale what was done to this trial", () => {
    const { text } = written({ shift: still, drift: null, scale: null });
    expect(text).toContain("No camera shake was subtracted");
    expect(text).toContain("No common flow of the fluid was subtracted");
    expect(text).toContain("No scale was given");
    const moved = written({ shift: shaken, drift: drift("turning swimmers") }).text;
    expect(moved).toContain("Camera shake was measured");
    expect(moved).toContain("measured from swimmers that turned");
    expect(written({ drift: drift("diffusing cells") }).text).toContain("measured from cells that only diffused");
  });
});
