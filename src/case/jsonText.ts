/**
 * Reads JSON with faults told by line and column. The language's own parser tells faults in other words in every
 * engine, and lets a field that stands twice pass in silence; so the text is walked once before it is parsed.
 */
import { DEEPEST_NESTING } from "./defaults.ts";

export interface JsonFault {
  readonly message: string;
  readonly mend: string;
  /** from 1 */
  readonly line: number;
  readonly column: number;
}

class Stop extends Error {
  readonly offset: number;
  readonly mend: string;
  constructor(message: string, mend: string, offset: number) {
    super(message);
    this.offset = offset;
    this.mend = mend;
  }
}

/** The value of a JSON text, or its first fault. */
export function readJson(text: string): { readonly value: unknown } | { readonly fault: JsonFault } {
  const plain = text.startsWith("\ufeff") ? text.slice(1) : text;
  try {
    new Walker(plain).document();
    return { value: JSON.parse(plain) as unknown };
  } catch (thrown) {
    if (!(thrown instanceof Stop)) throw thrown;
    const before = plain.slice(0, thrown.offset).split(/\r\n|\r|\n/);
    const line = before.length;
    const column = (before[line - 1]?.length ?? 0) + 1;
    return { fault: { message: thrown.message, mend: thrown.mend, line, column } };
  }
}

const STRING = /"(?:[^"\\\u0000-\u001f]|\\(?:["\\/bfnrt]|u[0-9a-fA-F]{4}))*"/y; // eslint-disable-line no-control-regex
const NUMBER = /-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?/y;
const WORD = /[A-Za-z_]\w*/y;
const SPACE = /[ \t\r\n]*/y;

/** Walks over one JSON text; throws Stop at the first fault. */
class Walker {
  private readonly text: string;
  private at = 0;
  private depth = 0;

  constructor(text: string) {
    this.text = text;
  }

  document(): void {
    this.space();
    if (this.at === this.text.length)
      this.stop("The file is empty.", "Open a case file, or start from a preset.");
    this.value();
    if (this.at < this.text.length) {
      this.stop(
        "Something follows after the end of the document.",
        "Look for a bracket too many before this place.",
      );
    }
  }

  private value(): void {
    const next = this.text[this.at];
    if (next === "{") this.members();
    else if (next === "[") this.items();
    else if (next === '"') this.string();
    else this.scalar(next);
    this.space();
  }

  private scalar(next: string | undefined): void {
    const number = this.match(NUMBER);
    const word = number === undefined ? this.match(WORD) : undefined;
    if (number !== undefined && !/[\w.,]/.test(this.text[this.at] ?? "")) return;
    if (number !== undefined && this.text[this.at] === ",") return;
    if (word === "true" || word === "false" || word === "null") return;
    this.at -= (number ?? word ?? "").length;
    if (next === undefined)
      this.stop("The file ends too soon.", "Look for a bracket or quote that is not closed.");
    if (word !== undefined)
      this.stop(`"${word}" stands without quotes.`, `Write "${word}" in double quotes, or a number.`);
    if (next === "'") this.stop("A text is in single quotes.", "Use double quotes.");
    if (next === "/")
      this.stop("A comment stands here; JSON has none.", 'Take it out, or put it into "notes".');
    if (number !== undefined || next === "." || next === "+") {
      this.stop(
        "A number is not written as JSON wants it.",
        'Write 0.5 or 12 or 1.5e3; a quantity with its unit in quotes: "12 mm".',
      );
    }
    if (next === "]" || next === "}" || next === ",")
      this.stop(`A value is missing before "${next}".`, "Give the value, or take out the comma before.");
    this.stop(
      `"${next}" is not expected here.`,
      "A value is expected: text in double quotes, a number, [ ] or { }.",
    );
  }

  private members(): void {
    this.enter();
    const keys = new Set<string>();
    let first = true;
    while (this.text[this.at] !== "}") {
      if (!first) this.comma("}");
      first = false;
      const keyAt = this.at;
      if (this.text[this.at] !== '"') this.noKey();
      const key = JSON.parse(this.string()) as string;
      if (keys.has(key))
        this.stop(`The field "${key}" stands twice in one object.`, "Keep one of them.", keyAt);
      if (key === "__proto__") this.stop('A field is named "__proto__".', "Use another name.", keyAt);
      keys.add(key);
      this.space();
      if (this.text[this.at] !== ":")
        this.stop(`A colon is missing after "${key}".`, "Write a colon between the name and its value.");
      this.at++;
      this.space();
      this.value();
    }
    this.leave();
  }

  private noKey(): never {
    if (this.text[this.at] === undefined) this.stop("The file ends too soon.", "Close the object with }.");
    if (this.text[this.at] === "/")
      this.stop("A comment stands here; JSON has none.", 'Take it out, or put it into "notes".');
    return this.stop(
      "The name of a field is expected here, in double quotes.",
      "Write names in double quotes; take out a comma before }.",
    );
  }

  private items(): void {
    this.enter();
    let first = true;
    while (this.text[this.at] !== "]") {
      if (!first) this.comma("]");
      first = false;
      if (this.text[this.at] === undefined) this.stop("The file ends too soon.", "Close the list with ].");
      this.value();
    }
    this.leave();
  }

  private comma(close: string): void {
    if (this.text[this.at] === undefined) this.stop("The file ends too soon.", `Close with ${close}.`);
    if (this.text[this.at] !== ",")
      this.stop(`A comma or ${close} is expected here.`, "Write a comma between two entries.");
    const commaAt = this.at++;
    this.space();
    if (this.text[this.at] === close)
      this.stop(`A comma stands before ${close}.`, "Take the comma out.", commaAt);
  }

  private string(): string {
    const string = this.match(STRING);
    if (string !== undefined) return string;
    return this.stop(
      "A text is not closed, or holds a line break or a wrong backslash.",
      'Close it with ", and write \\\\ for a backslash.',
    );
  }

  private enter(): void {
    if (++this.depth > DEEPEST_NESTING)
      this.stop("The brackets are nested too deep for a case.", "Open a case file.");
    this.at++;
    this.space();
  }
  private leave(): void {
    this.depth--;
    this.at++;
  }
  private space(): void {
    this.match(SPACE);
  }

  private match(pattern: RegExp): string | undefined {
    pattern.lastIndex = this.at;
    const found = pattern.exec(this.text)?.[0];
    if (found !== undefined) this.at += found.length;
    return found;
  }

  private stop(message: string, mend: string, offset = this.at): never {
    throw new Stop(message, mend, offset);
  }
}
