import type { MeasuredTrial } from "../../quantities/index.ts";
import type { Table, Value } from "./table.ts";

/** `cells.csv`: what each cell's path says, kept or not. */
export const cellsTable: Table = {
  name: "cells",
  title: "Cells",
  description: "What each cell's path says, one row a cell, whether or not it counts in the trial's figures.",
  primaryKey: ["cell"],
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
      name: "first_t_s",
      title: "First seen",
      description: "Capture time of the first sighting.",
      type: "number",
      unit: "s",
      decimals: 6,
      required: true,
    },
    {
      name: "last_t_s",
      title: "Last seen",
      description: "Capture time of the last sighting.",
      type: "number",
      unit: "s",
      decimals: 6,
      required: true,
    },
    {
      name: "frames",
      title: "Frames",
      description: "Frames in which the cell was sighted.",
      type: "integer",
      unit: "",
      required: true,
    },
    {
      name: "motile",
      title: "Motile",
      description:
        "Whether the cell moved more than diffusion and flow explain. Empty when its path is too short to say.",
      type: "boolean",
      unit: "",
    },
    {
      name: "speed_um_s",
      title: "Speed",
      description:
        "Swimming speed in the image plane, flow removed, corrected for localisation noise. Empty without a scale.",
      type: "number",
      unit: "µm/s",
      decimals: 4,
    },
    {
      name: "speed_se_um_s",
      title: "Standard error of the speed",
      description: "Standard error of speed_um_s.",
      type: "number",
      unit: "µm/s",
      decimals: 4,
    },
    {
      name: "straightness",
      title: "Straightness",
      description: "Net displacement over path length, corrected for localisation noise: 1 is a straight line.",
      type: "number",
      unit: "",
      decimals: 4,
    },
    {
      name: "mean_cos",
      title: "Mean cosine to the field",
      description:
        "Mean cosine between swimming direction and net field. Empty when there is no field or it was not measured.",
      type: "number",
      unit: "",
      decimals: 4,
    },
    {
      name: "polarity",
      title: "Polarity",
      description: "Which way along the field the cell swims. Empty when it was not measured.",
      type: "string",
      unit: "",
      values: ["north", "south"],
    },
    {
      name: "kept",
      title: "Kept",
      description: "Whether the cell counts in the trial's figures.",
      type: "boolean",
      unit: "",
      required: true,
    },
    {
      name: "reason",
      title: "Reason",
      description: "Why the cell is not kept. Empty when it is.",
      type: "string",
      unit: "",
    },
    {
      name: "speed_px_s",
      title: "Speed in pixels",
      description: "As speed_um_s, in pixels; there without a scale too.",
      type: "number",
      unit: "px/s",
      decimals: 4,
    },
    {
      name: "speed_se_px_s",
      title: "Standard error of the speed in pixels",
      description: "Standard error of speed_px_s.",
      type: "number",
      unit: "px/s",
      decimals: 4,
    },
    {
      name: "began",
      title: "Began",
      description: "How the path began.",
      type: "string",
      unit: "",
      values: ["first frame", "entered view", "appeared"],
    },
    {
      name: "ended",
      title: "Ended",
      description: "How the path ended.",
      type: "string",
      unit: "",
      values: ["last frame", "left view", "lost"],
    },
  ],
  rows: cellRows,
};

function* cellRows({ cells, paths, scale }: MeasuredTrial): Iterable<readonly Value[]> {
  const um = (px: number | null) => (px === null || scale === null ? null : px * scale.um_per_px);
  for (const [p, cell] of cells.entries()) {
    yield [
      cell.cell,
      cell.first_t_s,
      cell.last_t_s,
      cell.frames,
      cell.motile,
      um(cell.speed_px_s),
      um(cell.speedSe_px_s),
      cell.straightness,
      null,
      null,
      cell.kept,
      cell.reason,
      cell.speed_px_s,
      cell.speedSe_px_s,
      paths.began[p] ?? null,
      paths.ended[p] ?? null,
    ];
  }
}
