import { type OutputUnit, type Schema, Validator } from "@cfworker/json-schema";
import { nearNames } from "./nearest-name.ts";

/** One thing wrong with a document: where (`field.steps[1].t_s`), a full sentence, and what to do about it. */
export interface Problem {
  readonly field: string;
  readonly sentence: string;
  readonly remedy: string;
}

type Path = readonly string[];

/** Checks `document` against a JSON Schema (draft 2020-12). Empty when it fits. One problem per field. */
export function problemsOf(document: unknown, schema: Schema): Problem[] {
  // The library marks the schema it is given; the shared one stays as it is.
  const own = JSON.parse(JSON.stringify(schema)) as Schema;
  const { errors } = new Validator(own, "2020-12", false).validate(document);
  const problems = new Map<string, Problem>();
  for (const error of errors) {
    if (umbrella.has(error.keyword)) continue;
    const path = pathOf(error.instanceLocation);
    const problem =
      error.keyword === "required"
        ? missing(error, path, schema)
        : error.keyword === "false"
          ? forbidden(path)
          : wrongValue(document, path, schema);
    if (!problems.has(problem.field)) problems.set(problem.field, problem);
  }
  return [...problems.values()];
}

/** Keywords that only say that something below them failed. */
const umbrella = new Set([
  "$ref",
  "properties",
  "items",
  "prefixItems",
  "additionalProperties",
  "if",
  "allOf",
  "oneOf",
  "not",
]);

/** Names in `document` that the schema doesn't know, with the place they stand and the known name they resemble. */
export function unknownNames(document: unknown, schema: Schema): { field: string; nearest: string | null }[] {
  const found: { field: string; nearest: string | null }[] = [];
  const walk = (value: unknown, path: Path) => {
    const node = nodeAt(schema, path);
    if (Array.isArray(value)) {
      value.forEach((item, i) => {
        walk(item, [...path, String(i)]);
      });
    } else if (isRecord(value) && node?.properties) {
      const known = Object.keys(node.properties);
      for (const name of Object.keys(value)) {
        if (known.includes(name)) walk(value[name], [...path, name]);
        else found.push({ field: fieldName([...path, name]), nearest: nearNames(name, known)[0] ?? null });
      }
    }
  };
  walk(document, []);
  return found;
}

function missing(error: OutputUnit, path: Path, schema: Schema): Problem {
  const name = /property "(.*)"\.$/.exec(error.error)?.[1] ?? "";
  const full = [...path, name];
  const field = fieldName(full);
  const meaning = nodeAt(schema, full)?.title;
  return {
    field,
    sentence: `${field} is missing${meaning ? ` (${meaning})` : ""}.`,
    remedy: `Add ${JSON.stringify(name)}: ${wanted(nodeAt(schema, full))}.`,
  };
}

function forbidden(path: Path): Problem {
  const field = fieldName(path);
  const parent = fieldName(path.slice(0, -1));
  return {
    field,
    sentence: `${field} doesn't go together with the other entries of ${parent}.`,
    remedy: `Keep one way of giving ${parent} and delete the other.`,
  };
}

function wrongValue(document: unknown, path: Path, schema: Schema): Problem {
  const field = fieldName(path);
  const node = nodeAt(schema, path);
  const want = wanted(node);
  const title = node?.title ? ` (${node.title})` : "";
  return {
    field,
    sentence: `${field} is ${shown(valueAt(document, path))}, but must be ${want}${title}.`,
    remedy: `Set ${field} to ${want}.`,
  };
}

/** What a schema node asks for, as a phrase. */
function wanted(node: Schema | null): string {
  if (!node) return "something else";
  if (node.const !== undefined) return JSON.stringify(node.const);
  if (node.enum) return orList(node.enum.map((it) => JSON.stringify(it)));
  if (node.anyOf) return orList(node.anyOf.map(wanted));
  const types = ([] as string[]).concat(node.type ?? []).filter((type) => type !== "null");
  return orList(types.map((type) => wantedType(type, node)));
}

function wantedType(type: string, node: Schema): string {
  switch (type) {
    case "number": {
      if (node.exclusiveMinimum !== undefined) return `a number greater than ${node.exclusiveMinimum}`;
      if (node.minimum !== undefined && node.maximum !== undefined)
        return `a number from ${node.minimum} to ${node.maximum}`;
      if (node.minimum !== undefined) return `a number of ${node.minimum} or more`;
      return "a number";
    }
    case "string":
      return node.maxLength ? `text in double quotes, up to ${node.maxLength} characters` : "text in double quotes";
    case "array":
      if (node.minItems !== undefined && node.minItems === node.maxItems) return `a list of ${node.minItems} numbers`;
      return node.minItems ? "a list with at least one entry, in [ ]" : "a list, in [ ]";
    case "object":
      return "a group of entries, in { }";
    default:
      return type;
  }
}

/** What was found, short enough for a sentence. */
export function shown(value: unknown): string {
  if (typeof value === "string")
    return `the text ${JSON.stringify(value.length > 60 ? `${value.slice(0, 57)}…` : value)}`;
  if (value === undefined) return "missing";
  if (Array.isArray(value)) return value.length === 0 ? "an empty list" : `a list of ${value.length}`;
  if (isRecord(value)) return "a group of entries";
  return String(value);
}

/** `["field", "steps", "1", "t_s"]` as `field.steps[1].t_s`; the document itself as `the description`. */
function fieldName(path: Path): string {
  if (path.length === 0) return "the description";
  return path.reduce((name, step) => (/^\d+$/.test(step) ? `${name}[${step}]` : name ? `${name}.${step}` : step), "");
}

function pathOf(instanceLocation: string): Path {
  return instanceLocation
    .split("/")
    .slice(1)
    .map((step) => decodeURIComponent(step).replaceAll("~1", "/").replaceAll("~0", "~"));
}

function valueAt(document: unknown, path: Path): unknown {
  return path.reduce<unknown>((value, step) => (value as Record<string, unknown> | undefined)?.[step], document);
}

/** The schema node that describes the value at `path`. */
function nodeAt(schema: Schema, path: Path): Schema | null {
  let node: Schema | undefined = schema;
  for (const step of path) {
    const below: unknown = node?.properties?.[step] ?? (/^\d+$/.test(step) ? node?.items : undefined);
    if (!isRecord(below)) return null;
    node = resolve(below as Schema, schema);
  }
  return node ?? null;
}

function resolve(node: Schema, root: Schema): Schema {
  const name = node.$ref?.replace("#/$defs/", "");
  return name ? { ...(root.$defs?.[name] as Schema), ...node } : node;
}

function orList(items: readonly string[]): string {
  if (items.length <= 1) return items[0] ?? "something else";
  return `${items.slice(0, -1).join(", ")} or ${items.at(-1)}`;
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === "object" && value !== null && !Array.isArray(value);
}
