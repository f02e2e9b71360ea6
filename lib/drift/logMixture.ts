/** ln(share·e^first + (1 − share)·e^second), without overflow: the evidence of either of two explanations. */
export function logMixture(first: number, second: number, share: number): number {
  const larger = Math.max(first, second);
  return larger + Math.log(share * Math.exp(first - larger) + (1 - share) * Math.exp(second - larger));
}
