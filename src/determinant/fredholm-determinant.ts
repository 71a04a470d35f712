/**
 * The engine: det(I − zK) on a domain, refined until its tolerance holds.
 *
 * Discretization by F. Bornemann, "On the numerical evaluation of Fredholm determinants", Math. Comp. 79 (2010) 871:
 * Gauss–Legendre nodes, the determinant of I − z √w K √w. The order grows by a third at a time; the error is read
 * off the last differences (quadrature), the rounding model of `rounding-model.ts`, and the truncation of half-lines.
 */
import { requireFinite, requireInteger, requireNonNegative } from "../core/check.ts";
import { InvalidArgumentError } from "../core/errors.ts";
import type { Estimate } from "../core/estimate.ts";
import { type Arithmetic, requireArithmetic } from "../core/web-assembly.ts";
import { Workspace } from "../core/workspace.ts";
import { type Domain, partsOf } from "../quadrature/domain.ts";
import { quadratureError, quiet } from "./convergence.ts";
import { discretizedDeterminant } from "./discretized.ts";
import type { Kernel } from "./kernel.ts";
import { convergesLikeKink, extrapolateKink, type OrderedValue } from "./kink-extrapolation.ts";
import type { Discretized } from "./rounding-model.ts";
import { type Truncation, truncate } from "./truncation.ts";

/** Options of {@link fredholmDeterminant}. */
export interface DeterminantOptions {
  /** Factor z in det(I − zK). Default 1. */
  readonly z?: number;
  /** Absolute tolerance. Default 1e-13, or 0 when only `relTol` is given. */
  readonly absTol?: number;
  /** Tolerance relative to |det|. Default 1e-13, or 0 when only `absTol` is given. */
  readonly relTol?: number;
  /** Use exactly this many points a panel for the value; the error is then measured against a refined determinant. */
  readonly order?: number;
  /** Most points a panel that refinement may use. Default 4096 for generators, 512 for a formula. */
  readonly maxOrder?: number;
  /**
   * Compiled (`"wasm"`) or plain loops; results are the same, bit for bit. Default `"automatic"`: compiled where
   * WebAssembly with 128-bit lanes can be had and pays.
   */
  readonly arithmetic?: Arithmetic;
}

/** A determinant with its error, logarithm, sign and complement. */
export interface DeterminantEstimate extends Estimate {
  /** log |det|; its absolute error is about `error / |value|`. −∞ when no digit of a vanishing value is known. */
  readonly logAbs: number;
  /** Sign of the determinant: −1, 0 or 1. */
  readonly sign: number;
  /** 1 − det, computed without cancellation, with its own error. */
  readonly complement: Estimate;
}

/** A determinant together with the resolvent at a point, for densities. */
export interface DeterminantWithResolvent extends DeterminantEstimate {
  /** z R(s, s), R the kernel of K (I − zK)⁻¹: d/ds log det = z R(s, s) when s is the lower end of the domain. */
  readonly resolvent: Estimate;
}

const FIRST_ORDER = 8;
const MOST_STRUCTURED = 4096;
const MOST_DENSE = 512;

/**
 * Fredholm determinant det(I − zK) on a domain.
 *
 * Without tolerances the order is raised until rounding is all that is left; with them, until they hold.
 * `converged` says whether `error ≤ max(absTol, relTol · |value|)`.
 *
 * @param kernel - Made by `airyKernel()`, `integrableKernel(…)`, `smoothKernel(…)` and the like.
 * @param domain - Made by `interval`, `halfLine` or `union`.
 * @param options - z, tolerances and orders.
 * @returns Value, error, logarithm, sign and the complement 1 − det.
 * @throws {@link InvalidArgumentError} for a bad kernel, domain or option, or if the kernel returns a value that is not
 *   finite (the message says where).
 *
 * **Error.** Estimate: truncation + last difference (extrapolated only when a looser tolerance ends the refinement
 * early) + rounding model. **Cost.** Order n: O(n²) time and O(n) memory for two symmetric generators, n³/3 for a
 * formula; the whole refinement about twice its last order.
 *
 * @example
 * fredholmDeterminant(airyKernel(), halfLine(-2)).value; // F2(−2) ≈ 0.41322414250512
 */
export function fredholmDeterminant(
  kernel: Kernel,
  domain: Domain,
  options: DeterminantOptions = {},
): DeterminantEstimate {
  const { resolvent: _, ...result } = refine(kernel, domain, options, undefined);
  return result;
}

/**
 * {@link fredholmDeterminant} and, from the same eliminations, the resolvent at `point`.
 */
export function determinantWithResolvent(
  kernel: Kernel,
  domain: Domain,
  point: number,
  options: DeterminantOptions = {},
): DeterminantWithResolvent {
  return refine(kernel, domain, options, requireFinite("point", point));
}

interface Tolerance {
  readonly absolute: number;
  readonly relative: number;
  /** Whether refinement goes on until rounding is all that is left. */
  readonly finest: boolean;
}

function readTolerance(options: DeterminantOptions): Tolerance {
  const { absTol, relTol } = options;
  if (absTol !== undefined) requireNonNegative("options.absTol", absTol);
  if (relTol !== undefined) requireNonNegative("options.relTol", relTol);
  if (absTol === undefined && relTol === undefined) return { absolute: 1e-13, relative: 1e-13, finest: true };
  return { absolute: absTol ?? 0, relative: relTol ?? 0, finest: false };
}

function refine(
  kernel: Kernel,
  domain: Domain,
  options: DeterminantOptions,
  point: number | undefined,
): DeterminantWithResolvent {
  if (kernel?.kind !== "integrable" && kernel?.kind !== "smooth") {
    throw new InvalidArgumentError(
      "kernel",
      "a kernel made by integrableKernel(), smoothKernel() or a built-in one",
      kernel,
    );
  }
  const z = options.z === undefined ? 1 : requireFinite("options.z", options.z);
  const tolerance = readTolerance(options);
  const cap = kernel.kind === "smooth" ? MOST_DENSE : MOST_STRUCTURED;
  const limit = kernel.kind === "smooth" ? 4096 : 100_000;
  const maxOrder =
    options.maxOrder === undefined ? cap : requireInteger("options.maxOrder", options.maxOrder, 1, limit);
  const order =
    options.order === undefined ? undefined : requireInteger("options.order", options.order, 1, limit);
  const arithmetic = requireArithmetic("options.arithmetic", options.arithmetic);
  const truncation = truncate(partsOf(domain), kernel, z);
  if (z === 0) return { ...exactlyOne(), resolvent: exact(0) };
  const workspace = Workspace.borrow(512, arithmetic);
  try {
    const at = (n: number): Discretized =>
      discretizedDeterminant(kernel, truncation.panels, n, z, point, workspace);
    if (order === undefined) return settle(at, maxOrder, tolerance, truncation, point).result;
    const asked = at(order);
    const most = Math.max(maxOrder, Math.min(2 * order, limit));
    const best = settle(at, most, { ...tolerance, finest: true }, truncation, point);
    return fixedOrder(asked, order, best.result, tolerance);
  } finally {
    workspace.release();
  }
}

function exact(value: number): Estimate {
  return { value, error: 0, errorKind: "bound", converged: true, order: 0 };
}

function exactlyOne(): DeterminantEstimate {
  return { ...exact(1), logAbs: 0, sign: 1, complement: exact(0) };
}

/** Differences between successive orders, the latest last. */
interface Trail {
  value: number[];
  complement: number[];
  resolvent: number[];
}

function settle(
  at: (n: number) => Discretized,
  maxOrder: number,
  tolerance: Tolerance,
  truncation: Truncation,
  point: number | undefined,
): { result: DeterminantWithResolvent } {
  let n = Math.min(FIRST_ORDER, Math.max(1, Math.floor(maxOrder / 2)));
  let current = at(n);
  const trail: Trail = { value: [], complement: [], resolvent: [] };
  const history: OrderedValue[] = [orderedValue(n, current)];
  // A mapped half-line may converge like n⁻² for another reason, its end.
  const bounded = truncation.panels.every((panel) => !panel.mapped);
  let kinked: DeterminantWithResolvent | undefined; // the best extrapolated result, for kernels with a kink
  for (;;) {
    const next = Math.max(n + 1, Math.ceil((n * 4) / 3));
    if (next > maxOrder) {
      return { result: kinked ?? assemble(current, n, trail, tolerance, truncation, false) };
    }
    const refined = at(next);
    trail.value.push(Math.abs(refined.value - current.value));
    trail.complement.push(Math.abs(refined.complement - current.complement));
    trail.resolvent.push(Math.abs(refined.resolvent - current.resolvent));
    n = next;
    current = refined;
    history.push(orderedValue(n, current));
    if (trail.value.length < 2) continue;
    if (point === undefined && bounded && convergesLikeKink(history)) {
      const plain = assemble(current, n, trail, tolerance, truncation, false);
      const found = extrapolated(plain, history, tolerance, truncation);
      // Done when the tolerance holds, or when a further order no longer helps.
      if (kinked !== undefined && found.error >= 0.5 * kinked.error) return { result: kinked };
      if (found.error < plain.error) kinked = found;
      if (found.converged && !tolerance.finest) return { result: found };
      continue;
    }
    if (isSettled(trail, current, point !== undefined))
      return { result: assemble(current, n, trail, tolerance, truncation, true) };
    if (!tolerance.finest && trail.value.length >= 3) {
      const result = assemble(current, n, trail, tolerance, truncation, false);
      if (result.converged && (point === undefined || result.resolvent.converged)) return { result };
    }
  }
}

/** A determinant for extrapolation, by the route with fewer roundings: near 1 from its complement. */
function orderedValue(order: number, at: Discretized): OrderedValue {
  if (Math.abs(at.complement) >= 0.5) return { order, value: at.value, noise: at.noise };
  const value = 1 - at.complement;
  return { order, value, noise: at.complementNoise + 2 ** -53 * value };
}

/** The plain result with the extrapolated value in its place. */
function extrapolated(
  plain: DeterminantWithResolvent,
  history: readonly OrderedValue[],
  tolerance: Tolerance,
  truncation: Truncation,
): DeterminantWithResolvent {
  const { value, error: own } = extrapolateKink(history);
  const error = own + truncation.error * Math.abs(value);
  const judged = (x: number): Estimate => ({
    value: x,
    error,
    errorKind: "estimate",
    converged: error <= Math.max(tolerance.absolute, tolerance.relative * Math.abs(x)),
    order: plain.order,
  });
  return {
    ...judged(value),
    logAbs: Math.log(Math.abs(value)),
    sign: Math.sign(value),
    complement: judged(1 - value),
    resolvent: plain.resolvent,
  };
}

/** Whether what is left is rounding, or the differences have stopped falling just above it. */
function isSettled(trail: Trail, current: Discretized, withResolvent: boolean): boolean {
  const c = Math.abs(current.complement);
  return (
    quiet(trail.complement, current.complementNoise, c < 0.5 ? c : Math.max(1, Math.abs(current.value))) &&
    (!withResolvent || quiet(trail.resolvent, current.resolventNoise, Math.abs(current.resolvent)))
  );
}

function assemble(
  current: Discretized,
  order: number,
  trail: Trail,
  tolerance: Tolerance,
  truncation: Truncation,
  settled: boolean,
): DeterminantWithResolvent {
  const scale = Math.min(1, Math.abs(current.value)) || 1;
  const c = Math.abs(current.complement);
  const size = c < 0.5 ? c : 1;
  const estimate = (value: number, noise: number, differences: readonly number[], cut: number): Estimate => {
    const error = noise + quadratureError(differences, settled, Math.max(size, Math.abs(value))) + cut;
    const converged = error <= Math.max(tolerance.absolute, tolerance.relative * Math.abs(value));
    return { value, error, errorKind: "estimate", converged, order };
  };
  const complement = estimate(
    current.complement,
    current.complementNoise,
    trail.complement,
    truncation.error * scale,
  );
  const main =
    c < 0.5
      ? valueFromComplement(complement, tolerance)
      : estimate(current.value, current.noise, trail.value, truncation.error * Math.abs(current.value));
  return {
    ...main,
    logAbs: current.logAbs,
    sign: current.sign,
    complement,
    resolvent: estimate(current.resolvent, current.resolventNoise, trail.resolvent, truncation.error),
  };
}

/** det = 1 − complement: the error of the complement and one rounding. */
function valueFromComplement(complement: Estimate, tolerance: Tolerance): Estimate {
  const value = 1 - complement.value;
  const error = complement.error + 2 ** -53 * Math.abs(value);
  const converged = error <= Math.max(tolerance.absolute, tolerance.relative * Math.abs(value));
  return { ...complement, value, error, converged };
}

/** The determinant at the order asked for; its error is its distance from the refined one, plus that one's error. */
function fixedOrder(
  asked: Discretized,
  order: number,
  best: DeterminantWithResolvent,
  tolerance: Tolerance,
): DeterminantWithResolvent {
  const against = (value: number, noise: number, reference: Estimate): Estimate => {
    const error = Math.abs(value - reference.value) + reference.error + noise;
    const converged = error <= Math.max(tolerance.absolute, tolerance.relative * Math.abs(value));
    return { value, error, errorKind: "estimate", converged, order };
  };
  const value = Math.abs(asked.complement) < 0.5 ? 1 - asked.complement : asked.value;
  return {
    ...against(value, asked.noise, best),
    logAbs: asked.logAbs,
    sign: asked.sign,
    complement: against(asked.complement, asked.complementNoise, best.complement),
    resolvent: against(asked.resolvent, asked.resolventNoise, best.resolvent),
  };
}
