/** Argument checks shared by every room. Each throws {@link InvalidArgumentError} or returns its argument. */
import { InvalidArgumentError } from "./errors.ts";

/** Finite number, or throw. */
export function requireFinite(argument: string, value: unknown): number {
  if (typeof value !== "number" || !Number.isFinite(value))
    throw new InvalidArgumentError(argument, "a finite number", value);
  return value;
}

/** Integer in [least, most], or throw. */
export function requireInteger(argument: string, value: unknown, least: number, most: number): number {
  if (typeof value !== "number" || !Number.isInteger(value) || value < least || value > most) {
    throw new InvalidArgumentError(argument, `an integer from ${least} to ${most}`, value);
  }
  return value;
}

/** Finite number strictly between least and most, or throw. */
export function requireBetween(argument: string, value: unknown, least: number, most: number): number {
  if (typeof value !== "number" || !(value > least && value < most)) {
    throw new InvalidArgumentError(argument, `a number strictly between ${least} and ${most}`, value);
  }
  return value;
}

/** Finite number ≥ 0, or throw. */
export function requireNonNegative(argument: string, value: unknown): number {
  if (typeof value !== "number" || !(value >= 0) || value === Number.POSITIVE_INFINITY) {
    throw new InvalidArgumentError(argument, "a finite number ≥ 0", value);
  }
  return value;
}

/** A function, or throw. */
export function requireFunction(argument: string, value: unknown): void {
  if (typeof value !== "function") throw new InvalidArgumentError(argument, "a function", value);
}
