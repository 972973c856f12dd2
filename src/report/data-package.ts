import type { MeasuredTrial } from "../quantities/index.ts";
import type { Json } from "./json.ts";
import type { Column, Table } from "./tables/index.ts";

/**
 * The content of `datapackage.json`: what each table's columns are, mean and are measured in.
 *
 * Follows the Data Package standard 2.0 with Table Schema (datapackage.org); `unit` is a property of ours, which the
 * standard allows.
 */
export function dataPackageOf(measured: MeasuredTrial, tables: readonly { table: Table; bytes: Uint8Array }[]): Json {
  const { trial, source, tool } = measured;
  return {
    $schema: "https://datapackage.org/profiles/2.0/datapackage.json",
    name: slug(trial ?? source.recording),
    title: trial ? `Trial ${trial}` : `Recording ${source.recording}`,
    description: `Tables measured from the recording ${source.recording} by ${tool.name} ${tool.version}.`,
    sources: [{ title: `Recording ${source.recording}, SHA-256 ${source.sha256}` }],
    resources: tables.map(({ table, bytes }) => resource(table, bytes)),
  };
}

function resource(table: Table, bytes: Uint8Array): Json {
  return {
    name: table.name,
    type: "table",
    path: `${table.name}.csv`,
    title: table.title,
    description: table.description,
    scheme: "file",
    format: "csv",
    mediatype: "text/csv",
    encoding: "utf-8",
    bytes: bytes.length,
    dialect: { delimiter: ",", lineTerminator: "\n", quoteChar: '"', doubleQuote: true, header: true },
    schema: {
      fields: table.columns.map(field),
      missingValues: [""],
      primaryKey: table.primaryKey,
      ...(table.refersTo ? { foreignKeys: [foreignKey(table.refersTo)] } : {}),
    },
  };
}

function field(column: Column): Json {
  const constraints = {
    ...(column.required ? { required: true } : {}),
    ...(column.values ? { enum: column.values } : {}),
  };
  return {
    name: column.name,
    title: column.title,
    type: column.type,
    ...(column.type === "boolean" ? { trueValues: ["true"], falseValues: ["false"] } : {}),
    ...(column.unit ? { unit: column.unit } : {}),
    description: column.description,
    ...(Object.keys(constraints).length > 0 ? { constraints } : {}),
  };
}

function foreignKey(to: NonNullable<Table["refersTo"]>): Json {
  return { fields: [to.column], reference: { resource: to.table, fields: [to.theirColumn] } };
}

/** A name that a Data Package may have: lower-case letters, digits and single hyphens. */
function slug(name: string): string {
  const plain = name
    .normalize("NFKD")
    .toLowerCase()
    .replace(/[\u0300-\u036f]/g, "")
    .replace(/[^a-z0-9]+/g, "-")
    .replace(/^-|-$/g, "");
  return plain || "trial";
}
