/**
 * Gauss–Legendre rules and domains of integration.
 *
 * @packageDocumentation
 */
export {
  type Domain,
  type HalfLine,
  halfLine,
  type Interval,
  interval,
  type Union,
  union,
} from "./domain.ts";
export { gaussLegendre, type QuadratureRule } from "./gauss-legendre.ts";
