import { describe, expect, it } from "vitest";
import { exampleTrial } from "../../../tests/helpers/example-trial.ts";
import { rowsOf } from "../../quantities/index.ts";
import { pathOfSightings } from "./draw-sightings.ts";

describe("pathOfSightings", () => {
  it("knows the path of each sighting, and which belong to none", () => {
    const { paths } = exampleTrial();
    const count = paths.sighting.length;
    const pathOf = pathOfSightings(paths, count + 2);
    for (let p = 0; p < paths.count; p++) {
      const [first, end] = rowsOf(paths, p);
      for (let row = first; row < end; row++) expect(pathOf[paths.sighting[row]!]).toBe(p);
    }
    expect([...pathOf.slice(count)]).toEqual([-1, -1]);
  });
});
