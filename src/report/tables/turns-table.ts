import type { Table } from "./table.ts";

/** `turns.csv`: how each cell turned after each field reversal. No rows yet when turns were not measured. */
export const turnsTable: Table = {
  name: "turns",
  title: "Turns",
  description:
    "How each cell turned after the field reversed, one row a cell and reversal. No rows when turns were not measured.",
  primaryKey: ["cell", "reversal_t_s"],
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
      name: "reversal_t_s",
      title: "Reversal",
      description: "Capture time of the field's reversal.",
      type: "number",
      unit: "s",
      decimals: 6,
      required: true,
    },
    {
      name: "turn_rate_per_s",
      title: "Turn rate",
      description: "Rate at which the magnetic torque turns the cell.",
      type: "number",
      unit: "1/s",
      decimals: 4,
    },
    {
      name: "turn_rate_se_per_s",
      title: "Standard error of the turn rate",
      description: "Standard error of turn_rate_per_s.",
      type: "number",
      unit: "1/s",
      decimals: 4,
    },
    {
      name: "turn_time_s",
      title: "Turn time",
      description: "Time the turn took.",
      type: "number",
      unit: "s",
      decimals: 6,
    },
    {
      name: "turn_diameter_um",
      title: "Turn diameter",
      description: "Width of the turn across the field. Empty without a scale.",
      type: "number",
      unit: "µm",
      decimals: 4,
    },
    {
      name: "kept",
      title: "Kept",
      description: "Whether the turn counts in the trial's figures.",
      type: "boolean",
      unit: "",
      required: true,
    },
    {
      name: "reason",
      title: "Reason",
      description: "Why the turn is not kept. Empty when it is.",
      type: "string",
      unit: "",
    },
  ],
  rows: () => [],
};
