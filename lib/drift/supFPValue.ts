/**
 * Chance that the supremum of a squared Bessel bridge of dimension `columns`, s(1−s)-standardised and trimmed
 * by `trim` at both ends, exceeds `statistic`: the asymptotic law of supF (Andrews 1993). For the tail the
 * expansion of DeLong (1981) as used by Estrella (2003),
 * P ≈ x^{k/2} e^{−x/2} / (2^{k/2} Γ(k/2)) · [(1 − k/x) ln λ + 2/x], λ = ((1−trim)/trim)².
 */
export function supFPValue(statistic: number, columns: number, trim: number): number {
  const logLambda = 2 * Math.log((1 - trim) / trim);
  const half = columns / 2;
  const tail = (x: number) => {
    const density = Math.exp(half * Math.log(x / 2) - x / 2 - logGammaOfHalf(columns));
    return density * ((1 - columns / x) * logLambda + 2 / x);
  };
  // Left of its top the expansion no longer falls; there, and wherever it exceeds one, nothing speaks of a break.
  let top = columns;
  while (tail(top + 0.05) > tail(top)) top += 0.05;
  return statistic <= top ? 1 : Math.min(1, tail(statistic));
}

/** ln Γ(twice/2) by recursion from Γ(1) and Γ(1/2). */
function logGammaOfHalf(twice: number): number {
  let logarithm = twice % 2 === 0 ? 0 : 0.5 * Math.log(Math.PI);
  for (let at = twice - 2; at > 0; at -= 2) logarithm += Math.log(at / 2);
  return logarithm;
}
