/** Where a text stops being JSON, counted from 1, and what is wrong there, as a phrase. */
export interface JsonFault {
  readonly line: number;
  readonly column: number;
  readonly what: string;
}

const space = /[ \t\n\r]*/y;
const token =
  // biome-ignore lint/suspicious/noControlCharactersInRegex: JSON forbids exactly these inside text.
  /[{}[\],:]|"(?:[^"\\\u0000-\u001f]|\\(?:["\\/bfnrt]|u[0-9a-fA-F]{4}))*"|-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?(?![\w.])|(?:true|false|null)(?!\w)/y;

type Expected = "value" | "value or ]" | "key" | "key or }" | ":" | ", or end" | "nothing";

/**
 * Finds the first place where `text` breaks the grammar of JSON (RFC 8259), or null when it doesn't.
 *
 * JavaScript engines word and locate this each in their own way, some not at all; the same file should get the same
 * message everywhere, and one that names the usual slips of hand-written files.
 */
export function findJsonFault(text: string): JsonFault | null {
  const open: string[] = [];
  let expected: Expected = "value";
  let at = 0;
  let commaAt = -1;
  for (;;) {
    at += matchAt(space, text, at).length;
    if (at >= text.length) return expected === "nothing" ? null : fault(text, at, endPhrase(open, text));
    const word = matchAt(token, text, at);
    if (word === "") return fault(text, at, strangePhrase(text, at));
    const next = after(word, expected, open);
    if (next === null) {
      const closes = word === "}" || word === "]";
      if (closes && commaAt >= 0 && (expected === "key" || expected === "value")) {
        return fault(text, commaAt, "a comma stands after the last entry");
      }
      return fault(text, at, wrongPhrase(word, expected, open));
    }
    commaAt = word === "," ? at : -1;
    expected = next;
    at += word.length;
  }
}

/** The state after `word`, or null when it may not stand here. Keeps `open` up to date. */
function after(word: string, expected: Expected, open: string[]): Expected | null {
  const wantsValue = expected === "value" || expected === "value or ]";
  const closed = (): Expected => {
    open.pop();
    return open.length === 0 ? "nothing" : ", or end";
  };
  if (word === "{" || word === "[") {
    if (!wantsValue) return null;
    open.push(word);
    return word === "{" ? "key or }" : "value or ]";
  }
  const inside = open[open.length - 1];
  if (word === "}") return inside === "{" && (expected === "key or }" || expected === ", or end") ? closed() : null;
  if (word === "]") return inside === "[" && (expected === "value or ]" || expected === ", or end") ? closed() : null;
  if (word === ",") return expected === ", or end" ? (inside === "{" ? "key" : "value") : null;
  if (word === ":") return expected === ":" ? "value" : null;
  if (word.startsWith('"') && (expected === "key" || expected === "key or }")) return ":";
  if (!wantsValue) return null;
  return open.length === 0 ? "nothing" : ", or end";
}

function wrongPhrase(word: string, expected: Expected, open: readonly string[]): string {
  if (expected === "nothing") return "the description has ended, but more text follows";
  if (expected === ":") return "a colon is missing after the name";
  const mismatched = (word === "}" && open.at(-1) === "[") || (word === "]" && open.at(-1) === "{");
  if (mismatched) return `${word} closes what ${open.at(-1)} opened`;
  if (expected === ", or end" && word !== ":") return "a comma is missing before this";
  if (expected === "key" || expected === "key or }") return "a name in double quotes is wanted here";
  return "a value is wanted here";
}

function strangePhrase(text: string, at: number): string {
  const here = text.slice(at, at + 2);
  if (here === "//" || here === "/*" || here[0] === "#") return "JSON has no comments";
  if ("'‘’“”„«»`".includes(here[0]!)) return 'text must stand in straight double quotes (")';
  if (here[0] === '"') return "this text is not closed on its line, or holds a lone backslash (write \\\\)";
  if (/^[+\-.\d]/.test(here)) return "this is not a number as JSON writes it (0.5, -3, 1e-6)";
  if (/^[A-Za-z_$]/.test(here)) return "this word must stand in double quotes";
  return `${JSON.stringify(String.fromCodePoint(text.codePointAt(at)!))} can't stand here`;
}

function endPhrase(open: readonly string[], text: string): string {
  if (text.trim() === "") return "the file is empty";
  const last = open.at(-1);
  return last ? `the file ends before ${last} is closed` : "the file ends too early";
}

function fault(text: string, at: number, what: string): JsonFault {
  const before = text.slice(0, at);
  const lineStart = before.lastIndexOf("\n") + 1;
  return { line: before.split("\n").length, column: at - lineStart + 1, what };
}

function matchAt(pattern: RegExp, text: string, at: number): string {
  pattern.lastIndex = at;
  return pattern.exec(text)?.[0] ?? "";
}
