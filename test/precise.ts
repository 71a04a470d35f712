/**
 * Differences from decimal strings of more than double precision: a − b for a double a, correct to double precision.
 */

/** value − reference, the reference a decimal string of up to some fifty digits. */
export function differenceFrom(value: number, reference: string): number {
  const [hi, lo] = splitDecimal(reference);
  return value - hi - lo;
}

/** (value − reference) / reference. */
export function relativeDifference(value: number, reference: string): number {
  return differenceFrom(value, reference) / Number(reference);
}

/** The decimal string as a sum of two doubles. */
function splitDecimal(text: string): [number, number] {
  const hi = Number(text);
  if (hi === 0 || !Number.isFinite(hi)) return [hi, 0];
  // Exact: text = D / 10^k, hi = m · 2^e with integers D, m; the difference as a ratio of big integers.
  const match = /^([+-]?)(\d+)(?:\.(\d*))?(?:[eE]([+-]?\d+))?$/.exec(text.trim());
  if (!match) throw new Error(`not a decimal number: ${text}`);
  const [, sign, whole, fraction = "", exponent = "0"] = match;
  let numerator = BigInt(`${sign === "-" ? "-" : ""}${whole}${fraction}`);
  let denominator = 1n;
  const shift = Number(exponent) - fraction.length;
  if (shift >= 0) numerator *= 10n ** BigInt(shift);
  else denominator = 10n ** BigInt(-shift);
  let e = 0;
  let m = hi;
  while (!Number.isInteger(m)) {
    m *= 2;
    e++;
  }
  // text − hi = (numerator · 2^e − m · denominator) / (denominator · 2^e)
  const difference = (numerator << BigInt(e)) - BigInt(m) * denominator;
  const scale = denominator << BigInt(e);
  // 64 more bits are plenty: |difference / scale| ≤ ulp(hi)/2.
  const bits = BigInt(Math.max(0, scale.toString(2).length - difference.toString(2).length + 64));
  return [hi, Number((difference << bits) / scale) * 2 ** -Number(bits)];
}
