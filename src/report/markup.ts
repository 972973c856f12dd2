/** A piece of HTML or SVG that is safe to put into a page as it is. */
export class Markup {
  readonly text: string;
  constructor(text: string) {
    this.text = text;
  }
  toString(): string {
    return this.text;
  }
}

type Part = string | number | Markup | null | false | readonly Part[];

/**
 * Builds markup from a template. Whatever is put in is escaped unless it is itself {@link Markup}, so text from
 * outside can't become elements or attributes; lists are joined, null and false leave nothing.
 */
export function markup(pieces: TemplateStringsArray, ...parts: readonly Part[]): Markup {
  return new Markup(pieces.reduce((text, piece, i) => text + render(parts[i - 1] ?? null) + piece));
}

function render(part: Part): string {
  if (part === null || part === false) return "";
  if (part instanceof Markup) return part.text;
  if (typeof part === "number") return String(part);
  return typeof part === "string" ? escapeText(part) : part.map(render).join("");
}

const entities: Readonly<Record<string, string>> = {
  "&": "&amp;",
  "<": "&lt;",
  ">": "&gt;",
  '"': "&quot;",
  "'": "&#39;",
};

/** Text for HTML and SVG, in elements and in quoted attributes. Control characters, which pages can't hold, are replaced. */
export function escapeText(text: string): string {
  return text
    .replace(/[&<>"']/g, (c) => entities[c]!)
    .replace(/\p{Cc}/gu, (c) => ("\t\n\r".includes(c) ? c : "\ufffd"));
}
