export interface ComplexNumber {
  readonly re: number;
  readonly im: number;
}

/**
 * Roots of the monic polynomial z^p + c_1 z^{p−1} + … + c_p, by the simultaneous iteration of Ehrlich (1967) and
 * Aberth (1973); quadratics in closed form. Trailing zero coefficients give exact zero roots. Simple roots are good
 * to about 1e-15 of their size; a root that occurs m times to about the m-th root of that.
 *
 * @example polynomialRoots([-3, 2]) // 2 and 1
 */
export function polynomialRoots(coefficients: ArrayLike<number>): ComplexNumber[] {
  let radius = 0;
  for (let i = 0; i < coefficients.length; i++) {
    radius = Math.max(radius, Math.abs(coefficients[i]) ** (1 / (i + 1)));
  }
  // In units of the radius no power overflows; a radius below 1e-40, whose powers would, is taken as zero. A last coefficient below 1e-30 is far below the rounding of the others:
  // its root is taken as zero.
  const scaled = Float64Array.from(coefficients, (value, i) => value / radius ** (i + 1));
  let degree = radius > 1e-40 ? scaled.length : 0;
  while (degree > 0 && Math.abs(scaled[degree - 1]) < 1e-30) degree--;
  const zeros = Array.from({ length: scaled.length - degree }, () => ({ re: 0, im: 0 }));
  if (degree === 0) return zeros;
  if (degree === 1) return [{ re: -coefficients[0], im: 0 }, ...zeros];
  if (degree === 2) return [...quadraticRoots(coefficients[0], coefficients[1]), ...zeros];
  const unit = aberth(scaled, degree);
  return [...unit.map(({ re, im }) => ({ re: re * radius, im: im * radius })), ...zeros];
}

function quadraticRoots(b: number, c: number): ComplexNumber[] {
  const half = -b / 2;
  const discriminant = half * half - c;
  if (discriminant < 0) {
    const im = Math.sqrt(-discriminant);
    return [
      { re: half, im },
      { re: half, im: -im },
    ];
  }
  // The root of larger size first; the other from the product, which does not cancel.
  const large = half + (half >= 0 ? 1 : -1) * Math.sqrt(discriminant);
  return [
    { re: large, im: 0 },
    { re: c / large, im: 0 },
  ];
}

/** Roots in units of the radius. */
function aberth(coefficients: ArrayLike<number>, degree: number): ComplexNumber[] {
  const re = new Float64Array(degree);
  const im = new Float64Array(degree);
  for (let i = 0; i < degree; i++) {
    // An angle that avoids the real axis and symmetry.
    const angle = (2 * Math.PI * i) / degree + 0.4;
    re[i] = Math.cos(angle);
    im[i] = Math.sin(angle);
  }
  for (let iteration = 0; iteration < 500; iteration++) {
    let moved = 0;
    for (let i = 0; i < degree; i++) {
      const step = aberthStep(coefficients, degree, re, im, i);
      re[i] -= step.re;
      im[i] -= step.im;
      moved = Math.max(moved, Math.hypot(step.re, step.im) / Math.hypot(re[i], im[i]));
    }
    if (!(moved > 4e-16)) break;
  }
  return Array.from(re, (value, i) => ({ re: value, im: im[i] }));
}

/** Newton's step of root i, divided by one minus itself times the pull of the other roots. */
function aberthStep(
  coefficients: ArrayLike<number>,
  degree: number,
  re: Float64Array,
  im: Float64Array,
  i: number,
): ComplexNumber {
  const x = re[i];
  const y = im[i];
  let valueRe = 1;
  let valueIm = 0;
  let slopeRe = 0;
  let slopeIm = 0;
  for (let k = 0; k < degree; k++) {
    const nextSlopeRe = slopeRe * x - slopeIm * y + valueRe;
    slopeIm = slopeRe * y + slopeIm * x + valueIm;
    slopeRe = nextSlopeRe;
    const nextValueRe = valueRe * x - valueIm * y + coefficients[k];
    valueIm = valueRe * y + valueIm * x;
    valueRe = nextValueRe;
  }
  // 1/step = slope/value − Σ 1/(z_i − z_j)
  const size = valueRe * valueRe + valueIm * valueIm;
  // At the root, or so near that the square of the value is below what a number can hold.
  if (!(size > 0)) return { re: 0, im: 0 };
  let inverseRe = (slopeRe * valueRe + slopeIm * valueIm) / size;
  let inverseIm = (slopeIm * valueRe - slopeRe * valueIm) / size;
  for (let j = 0; j < degree; j++) {
    if (j === i) continue;
    const dx = x - re[j];
    const dy = y - im[j];
    const distance = dx * dx + dy * dy;
    if (distance === 0) continue;
    inverseRe -= dx / distance;
    inverseIm += dy / distance;
  }
  const inverseSize = inverseRe * inverseRe + inverseIm * inverseIm;
  if (!(inverseSize > 0)) return { re: 0, im: 0 };
  return { re: inverseRe / inverseSize, im: -inverseIm / inverseSize };
}
