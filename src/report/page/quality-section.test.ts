import { describe, expect, it } from "vitest";
import { exampleTrial } from "../../../tests/helpers/example-trial.ts";
import type { QualityCheck } from "../../quantities/index.ts";
import { checksInWords, qualitySection } from "./quality-section.ts";

const check = (changes: Partial<QualityCheck>): QualityCheck => ({
  check: "focus",
  figure: 0.2,
  unit: "share of sightings blurred",
  verdict: "good",
  advice: "",
  ...changes,
});

/** The last column of the table, as read. */
function figure(changes: Partial<QualityCheck>): string {
  const table = qualitySection(exampleTrial({ quality: [check(changes)] })).text;
  const cell = /<td class="measure">(.*?)<\/td>/.exec(table)?.[1] as string;
  return cell.replace(/<[^>]*>/g, "").replaceAll("\u00a0", " ");
}

describe("figures of the footage checks", () => {
  it.each([
    [0.2, "20 % of sightings blurred"],
    [0.0312, "3.1 % of sightings blurred"],
    [0.0002793, "below 0.1 % of sightings blurred"],
    [0, "0 % of sightings blurred"],
  ])("a share of %d is a percentage", (value, read) => {
    expect(figure({ figure: value })).toBe(read);
  });

  it("others have three digits and what they count", () => {
    expect(figure({ figure: 22.641, unit: "px per frame" })).toBe("22.6 px per frame");
  });

  it("is not known where nothing was measured", () => {
    expect(figure({ figure: null })).toBe("not known");
  });
});

describe("checksInWords", () => {
  it("names what limits, worst first", () => {
    const quality = [
      check({ check: "exposure", verdict: "fair" }),
      check({ check: "frame_rate", verdict: "poor" }),
      check({ check: "shake", verdict: "unknown" }),
    ];
    expect(checksInWords(quality)).toBe("frame rate poor, exposure fair, shake unknown");
    expect(checksInWords([...quality, check({})])).toBe("frame rate poor, exposure fair, shake unknown, the rest good");
  });

  it("says so when all is good", () => {
    expect(checksInWords([check({}), check({ check: "shake" })])).toBe("all 2 checks good");
  });
});
