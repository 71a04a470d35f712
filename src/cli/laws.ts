/** Laws by the names the command line knows. */
import { InvalidArgumentError } from "../core/errors.ts";
import type { Law } from "../laws/law.ts";
import { type QuaternionScaling, tracyWidom } from "../laws/tracy-widom.ts";
import { choiceList, choiceOption, type Mentions } from "./values.ts";

/** Names of laws. */
export const LAW_NAMES = ["F1", "F2", "F4"] as const;

/** Name of a law. */
export type LawName = (typeof LAW_NAMES)[number];

/** Scalings of the β = 4 law. */
export const SCALINGS = [
  "standard",
  "unscaled",
  "stochastic-airy",
] as const satisfies readonly QuaternionScaling[];

/** What help says about the laws. */
export const LAWS_HELP = `
Laws:
  F1  Tracy-Widom, beta = 1: largest eigenvalue of real symmetric or real covariance matrices
  F2  Tracy-Widom, beta = 2: the same for complex matrices; also growth models from a point
  F4  Tracy-Widom, beta = 4: the same for quaternion matrices
  Three scalings of F4 are in use, and numbers in one are up to 59 % off in another. Write G(s) for the
  mean of det(I-V) and det(I+V). Choose with --beta4-scaling:
    standard         F4(x) = G(2^(1/2) x), as in most tables of moments (mean -2.30688)
    unscaled         F4(x) = G(x)                                       (mean -3.26243)
    stochastic-airy  F4(x) = G(2^(2/3) x), as in general-beta work      (mean -2.05520)
  Every report says which one it used.`;

/** The laws that were asked for. */
export interface LawChoice {
  readonly laws: readonly Law[];
  readonly scaling: QuaternionScaling | undefined;
}

/**
 * The laws of `--laws`.
 *
 * @throws InvalidArgumentError for an unknown name, one given twice, or a scaling without F4.
 */
export function chooseLaws(option: string, names: Mentions, scalingMentions: Mentions): LawChoice {
  const chosen = choiceList(option, names, LAW_NAMES);
  if (chosen.length === 0) throw new InvalidArgumentError(option, `some of ${LAW_NAMES.join(", ")}`, "");
  const scaling = choiceOption("--beta4-scaling", scalingMentions, SCALINGS);
  if (scaling !== undefined && !chosen.includes("F4")) {
    throw new InvalidArgumentError(
      "--beta4-scaling",
      "the law F4 among the laws (the others have one scaling)",
      scaling,
    );
  }
  return {
    laws: chosen.map((name) => lawByName(name, scaling)),
    scaling: chosen.includes("F4") ? (scaling ?? "standard") : undefined,
  };
}

function lawByName(name: LawName, scaling: QuaternionScaling | undefined): Law {
  if (name === "F1") return tracyWidom(1);
  if (name === "F2") return tracyWidom(2);
  return tracyWidom(4, { scaling: scaling ?? "standard" });
}
