import { readdirSync, readFileSync, statSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { beforeAll, describe, expect, it } from "vitest";
import { type Assay, assayPresets, planAssay, trialJson, truthCsv, truthJson } from "../src/assay/index.ts";
import { readTrialFolder } from "../src/cli/trial-folder.ts";
import { openInNode } from "../src/footage/node/index.ts";

const folder = fileURLToPath(new URL("../fixtures/demo-trial", import.meta.url));
const text = (name: string) => readFileSync(`${folder}/${name}`, "utf8");
const pretty = (value: unknown) => `${JSON.stringify(value, null, 2)}\n`;
const preset = assayPresets.demo!;

describe("the demo trial", () => {
  let assay: Assay;
  beforeAll(() => {
    assay = planAssay(preset.options);
  });

  it("is small, and reads without a warning: scale, and a field that reverses twice", async () => {
    const bytes = readdirSync(folder).reduce((sum, name) => sum + statSync(`${folder}/${name}`).size, 0);
    expect(bytes).toBeLessThan(4e6);
    const { warnings } = await readTrialFolder(folder);
    expect(warnings).toEqual([]);
    const { scale, field } = JSON.parse(text("trial.json"));
    expect(scale.um_per_px).toBeGreaterThan(0);
    expect(scale.uncertainty_um_per_px).toBeGreaterThan(0);
    expect(field.steps.map((s: { angle_deg: number }) => s.angle_deg)).toEqual([0, 180, 0]);
  });

  it("is what the preset makes today, to the last digit of its truth", () => {
    expect(text("trial.json")).toBe(pretty(trialJson(assay.settings, "swim.mp4", preset.labels ?? {})));
    expect(text("truth.csv")).toBe(truthCsv(assay));
    expect(text("truth.json")).toBe(pretty(truthJson(assay)));
  });

  it("shows in its recording what the preset draws", async () => {
    const footage = await openInNode(`${folder}/swim.mp4`, {});
    const drawn = new Uint8Array(assay.width * assay.height);
    let frames = 0;
    let worst = 0;
    try {
      await footage.read(({ luma, t_s, index }) => {
        frames++;
        expect(Math.abs(t_s - (assay.times_s[index] as number))).toBeLessThan(1e-6);
        if (index % 60 === 30) {
          assay.render(index, drawn);
          const square = drawn.reduce((sum, v, k) => sum + ((luma[k] as number) - (16 + (219 * v) / 255)) ** 2, 0);
          worst = Math.max(worst, Math.sqrt(square / drawn.length));
        }
        return "more";
      });
    } finally {
      footage.close();
    }
    expect(frames).toBe(assay.frames);
    // What the encoder takes away is of the size of the noise, 1.8 grey levels; a frame's shift would be more.
    expect(worst).toBeGreaterThan(0);
    expect(worst).toBeLessThan(1.8);
  });
});
