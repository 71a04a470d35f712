/**
 * Option values: text in, checked values out. Each failure names the option, the value and what is allowed.
 *
 * Options arrive as lists of texts, one a mention: lists may be split over several mentions, single values may
 * be given once only. The checks are valibot schemas, so that a rule and its words stand side by side.
 */
import * as v from "valibot";
import { InvalidArgumentError } from "../core/errors.ts";

/** What commander hands over: every mention of an option, in order. */
export type Mentions = readonly string[] | undefined;

/** Collects mentions; given to commander as the parser of every option. */
export function collectMentions(value: string, previous: readonly string[] | undefined): readonly string[] {
  return [...(previous ?? []), value];
}

const MOST_NUMBERS = 100_000;
const DECIMAL = /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i;

const decimal = v.pipe(
  v.string(),
  v.trim(),
  v.regex(DECIMAL, "a decimal number"),
  v.transform(Number),
  v.check((x: number) => Number.isFinite(x), "a finite number"),
);

const probability = v.pipe(
  decimal,
  v.check((p: number) => p > 0 && p < 1, "a probability strictly between 0 and 1"),
);

/** Parses by a schema or throws with the schema's words. */
function parse<T>(option: string, text: string, schema: v.GenericSchema<string, T>): T {
  const result = v.safeParse(schema, text, { abortEarly: true });
  if (result.success) return result.output;
  throw new InvalidArgumentError(option, result.issues[0].message, text);
}

/** The one mention of an option that may be given once; undefined if it was not given. */
export function single(option: string, mentions: Mentions): string | undefined {
  if (mentions === undefined || mentions.length === 0) return undefined;
  if (mentions.length > 1) throw new InvalidArgumentError(option, "to be given once", mentions.join(" and "));
  const value = mentions[0] as string;
  // `--output --format csv` would otherwise write to a file named "--format".
  if (value === "" || value.startsWith("--")) throw new InvalidArgumentError(option, "a value", value);
  return value;
}

/** The items of a comma-separated option. */
function items(option: string, mentions: Mentions): string[] {
  const list = (mentions ?? []).flatMap((mention) => mention.split(","));
  if (list.some((item) => item.trim() === "")) {
    throw new InvalidArgumentError(
      option,
      "a comma-separated list without empty places",
      mentions?.join(","),
    );
  }
  return list.map((item) => item.trim());
}

/** An integer in a range, or undefined. */
export function integerOption(
  option: string,
  mentions: Mentions,
  least: number,
  most: number,
): number | undefined {
  const text = single(option, mentions);
  if (text === undefined) return undefined;
  const allowed = `an integer from ${least} to ${most}`;
  const integer = v.pipe(
    v.string(),
    v.regex(/^[+-]?\d+$/, allowed),
    v.transform(Number),
    v.minValue(least, allowed),
    v.maxValue(most, allowed),
  );
  return parse(option, text, integer);
}

/** A number greater than 0, or undefined. */
export function positiveOption(option: string, mentions: Mentions): number | undefined {
  const text = single(option, mentions);
  if (text === undefined) return undefined;
  return parse(
    option,
    text,
    v.pipe(
      decimal,
      v.check((x: number) => x > 0, "a number greater than 0"),
    ),
  );
}

/** A probability strictly between 0 and 1, or undefined. */
export function probabilityOption(option: string, mentions: Mentions): number | undefined {
  const text = single(option, mentions);
  return text === undefined ? undefined : parse(option, text, probability);
}

/** Probabilities strictly between 0 and 1. */
export function probabilityList(option: string, mentions: Mentions): number[] {
  return items(option, mentions).map((item) => parse(option, item, probability));
}

/** One of a few words, or undefined. */
export function choiceOption<T extends string>(
  option: string,
  mentions: Mentions,
  allowed: readonly T[],
): T | undefined {
  const text = single(option, mentions);
  return text === undefined ? undefined : choice(option, text, allowed);
}

/** Some of a few words, each once. */
export function choiceList<T extends string>(option: string, mentions: Mentions, allowed: readonly T[]): T[] {
  const chosen = items(option, mentions).map((item) => choice(option, item, allowed));
  const twice = chosen.find((item, i) => chosen.indexOf(item) !== i);
  if (twice !== undefined) throw new InvalidArgumentError(option, "each choice once", twice);
  return chosen;
}

function choice<T extends string>(option: string, text: string, allowed: readonly T[]): T {
  const found = allowed.find((word) => word.toLowerCase() === text.toLowerCase());
  if (found === undefined) throw new InvalidArgumentError(option, `one of ${allowed.join(", ")}`, text);
  return found;
}

/** Numbers and ranges `from:to:step` (both ends included). */
export function numberList(option: string, mentions: Mentions): number[] {
  const numbers: number[] = [];
  for (const item of items(option, mentions)) {
    if (item.includes(":")) for (const number of range(option, item)) numbers.push(number);
    else numbers.push(parse(option, item, decimal));
    if (numbers.length > MOST_NUMBERS)
      throw new InvalidArgumentError(option, `at most ${MOST_NUMBERS} numbers`, item);
  }
  return numbers;
}

function range(option: string, text: string): number[] {
  const parts = text.split(":");
  const allowed = "a number, or a range from:to:step with a step greater than 0 and to ≥ from";
  if (parts.length !== 3) throw new InvalidArgumentError(option, allowed, text);
  const [from, to, step] = parts.map((part) => parse(option, part, decimal)) as [number, number, number];
  if (!(step > 0) || !(to >= from)) throw new InvalidArgumentError(option, allowed, text);
  // Half a millionth of a step of slack, so that 0:1:0.1 has its last point in spite of rounding.
  const steps = Math.floor((to - from) / step + 5e-7);
  if (!(steps < MOST_NUMBERS))
    throw new InvalidArgumentError(option, `at most ${MOST_NUMBERS} numbers`, text);
  // Fifteen digits: -6:2:0.1 gives -5.9, not -5.8999999999999995.
  return Array.from({ length: steps + 1 }, (_, i) => Number((from + i * step).toPrecision(15)));
}
