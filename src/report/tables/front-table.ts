import type { Table } from "./table.ts";

/** `front.csv`: where the edge of a moving spot was in each frame. No rows when no spot was measured. */
export const frontTable: Table = {
  name: "front",
  title: "Front",
  description: "Where the moving edge of a spot was, one row a frame. No rows when no spot was measured.",
  primaryKey: ["frame"],
  columns: [
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
      name: "front_um",
      title: "Front",
      description: "Position of the edge along the spot's direction of travel.",
      type: "number",
      unit: "µm",
      decimals: 4,
    },
    {
      name: "centre_x_um",
      title: "Centre x",
      description: "Centre of the spot, to the right.",
      type: "number",
      unit: "µm",
      decimals: 4,
    },
    {
      name: "centre_y_um",
      title: "Centre y",
      description: "Centre of the spot, upwards.",
      type: "number",
      unit: "µm",
      decimals: 4,
    },
    { name: "area_um2", title: "Area", description: "Area of the spot.", type: "number", unit: "µm²", decimals: 4 },
  ],
  rows: () => [],
};
