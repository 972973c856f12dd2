import { type MeasuredTrial, rowsOf } from "../../quantities/index.ts";
import type { Table, Value } from "./table.ts";

/** `paths.csv`: where each cell was in each frame it was sighted in. */
export const pathsTable: Table = {
  name: "paths",
  title: "Paths",
  description:
    "Where each cell was, one row a cell and frame. Frames in which a cell was followed without being sighted have no row.",
  primaryKey: ["cell", "frame"],
  refersTo: { column: "cell", table: "cells", theirColumn: "cell" },
  columns: [
    {
      name: "cell",
      title: "Cell",
      description: "Number of the cell, from 1.",
      type: "integer",
      unit: "",
      required: true,
    },
    {
      name: "frame",
      title: "Frame",
      description: "Decoded frames counted from 0.",
      type: "integer",
      unit: "",
      required: true,
    },
    {
      name: "t_s",
      title: "Time",
      description: "Capture time since the first frame.",
      type: "number",
      unit: "s",
      decimals: 6,
      required: true,
    },
    {
      name: "x_px",
      title: "x in the picture",
      description:
        "Position in the upright picture, from the centre of its top-left pixel to the right; camera shake included.",
      type: "number",
      unit: "px",
      decimals: 3,
      required: true,
    },
    {
      name: "y_px",
      title: "y in the picture",
      description:
        "Position in the upright picture, from the centre of its top-left pixel down; camera shake included.",
      type: "number",
      unit: "px",
      decimals: 3,
      required: true,
    },
    {
      name: "x_um",
      title: "x in the sample",
      description: "Position in the sample, same origin, to the right; camera shake removed. Empty without a scale.",
      type: "number",
      unit: "µm",
      decimals: 4,
    },
    {
      name: "y_um",
      title: "y in the sample",
      description:
        "Position in the sample, same origin, upwards (so negative inside the picture); camera shake removed. Empty without a scale.",
      type: "number",
      unit: "µm",
      decimals: 4,
    },
  ],
  rows: pathRows,
};

function* pathRows({ paths, scale, shift }: MeasuredTrial): Iterable<readonly Value[]> {
  for (let p = 0; p < paths.count; p++) {
    const [first, end] = rowsOf(paths, p);
    for (let row = first; row < end; row++) {
      const frame = paths.frame[row]!;
      const x = paths.x_px[row]!;
      const y = paths.y_px[row]!;
      yield [
        p + 1,
        frame,
        paths.t_s[row]!,
        x + (shift.x_px[frame] as number),
        y + (shift.y_px[frame] as number),
        scale && x * scale.um_per_px,
        scale && -y * scale.um_per_px,
      ];
    }
  }
}
