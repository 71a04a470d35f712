/**
 * Domains of integration: intervals, half-lines and unions of them. A domain is its quadrature: the engine only
 * asks for panels (finite intervals) and fills each with a Gauss–Legendre rule.
 */
import { requireFinite } from "../core/check.ts";
import { InvalidArgumentError } from "../core/errors.ts";

/** A bounded interval (lower, upper). */
export interface Interval {
  readonly kind: "interval";
  readonly lower: number;
  readonly upper: number;
}

/** The half-line (lower, ∞); the engine truncates it by the kernel's own decay. */
export interface HalfLine {
  readonly kind: "halfLine";
  readonly lower: number;
}

/** Disjoint intervals, at most the last of which is a half-line, in increasing order. */
export interface Union {
  readonly kind: "union";
  readonly parts: readonly (Interval | HalfLine)[];
}

/** A domain on the real line. */
export type Domain = Interval | HalfLine | Union;

/**
 * The interval (lower, upper).
 *
 * @param lower - Finite left end.
 * @param upper - Finite right end, above `lower`.
 * @throws {@link InvalidArgumentError} if an end is not finite or the interval is empty or reversed.
 */
export function interval(lower: number, upper: number): Interval {
  requireFinite("lower", lower);
  if (typeof upper !== "number" || !(upper > lower) || upper === Number.POSITIVE_INFINITY) {
    throw new InvalidArgumentError("upper", `a finite number above lower = ${lower}`, upper);
  }
  return Object.freeze({ kind: "interval", lower, upper });
}

/**
 * The half-line (lower, ∞).
 *
 * @param lower - Finite left end.
 * @throws {@link InvalidArgumentError} if `lower` is not finite.
 */
export function halfLine(lower: number): HalfLine {
  requireFinite("lower", lower);
  return Object.freeze({ kind: "halfLine", lower });
}

/**
 * The union of disjoint domains, given in any order. Parts may touch; they may not overlap.
 *
 * @param domains - At least one interval, half-line or union.
 * @throws {@link InvalidArgumentError} if there is none or if two of them overlap.
 */
export function union(...domains: Domain[]): Union {
  if (domains.length === 0) throw new InvalidArgumentError("domains", "at least one domain", domains);
  const parts = domains.flatMap((domain, i) => partsOf(domain, `domains[${i}]`));
  parts.sort((p, q) => p.lower - q.lower);
  for (let i = 1; i < parts.length; i++) {
    if (upperEnd(parts[i - 1]) > parts[i].lower) {
      throw new InvalidArgumentError(
        "domains",
        "disjoint domains",
        `(${parts[i - 1].lower}, ${upperEnd(parts[i - 1])}) and (${parts[i].lower}, ${upperEnd(parts[i])})`,
      );
    }
  }
  return Object.freeze({ kind: "union", parts: Object.freeze(parts) });
}

/** The intervals and half-lines a domain is made of, in increasing order. Throws for anything else. */
export function partsOf(domain: Domain, argument = "domain"): (Interval | HalfLine)[] {
  const kind = (domain as Domain | undefined | null)?.kind;
  // Objects made by hand pass through the constructors, so that their ends are checked too.
  if (kind === "interval") return [interval((domain as Interval).lower, (domain as Interval).upper)];
  if (kind === "halfLine") return [halfLine((domain as HalfLine).lower)];
  if (kind === "union") return (domain as Union).parts.flatMap((part) => partsOf(part, argument));
  throw new InvalidArgumentError(argument, "a domain made by interval(), halfLine() or union()", domain);
}

/** Right end of a part: its upper end, or infinity. */
export function upperEnd(part: Interval | HalfLine): number {
  return part.kind === "interval" ? part.upper : Number.POSITIVE_INFINITY;
}
