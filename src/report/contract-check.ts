import { type Schema, Validator } from "@cfworker/json-schema";
import dataPackageSchema from "../../docs/schemas/datapackage.schema.json" with { type: "json" };
import summarySchema from "../../docs/schemas/summary-1.schema.json" with { type: "json" };
import type { Json } from "./json.ts";

/** Throws when a summary is not what the contract promises: a failure of ours that must not reach a result folder. */
export function checkSummary(summary: Json): void {
  check(summary, summarySchema as Schema, "summary.json");
}

/** Throws when a data package description is not what the contract promises. */
export function checkDataPackage(description: Json): void {
  check(description, dataPackageSchema as Schema, "datapackage.json");
}

function check(document: Json, schema: Schema, name: string): void {
  // The library marks the schema it is given; the shared one stays as it is.
  const own = JSON.parse(JSON.stringify(schema)) as Schema;
  const { valid, errors } = new Validator(own, "2020-12", false).validate(document);
  if (valid) return;
  const deepest = errors.reduce((a, b) => (b.instanceLocation.length >= a.instanceLocation.length ? b : a));
  throw new Error(`${name} breaks its schema at ${deepest.instanceLocation}: ${deepest.error}`);
}
