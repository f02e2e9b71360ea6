/**
 * Quantile of the standard normal distribution, accurate to about 1e-16 relative: algorithm AS 241, PPND16
 * (Wichura 1988, Applied Statistics 37). `probability` strictly between 0 and 1.
 */
export function normalQuantile(probability: number): number {
  const q = probability - 0.5;
  if (Math.abs(q) <= 0.425) {
    const r = 0.180625 - q * q;
    return (q * rational(r, CENTRE_ABOVE)) / rational(r, CENTRE_BELOW);
  }
  const tail = q < 0 ? probability : 1 - probability;
  let r = Math.sqrt(-Math.log(tail));
  let value: number;
  if (r <= 5) {
    r -= 1.6;
    value = rational(r, MIDDLE_ABOVE) / rational(r, MIDDLE_BELOW);
  } else {
    r -= 5;
    value = rational(r, FAR_ABOVE) / rational(r, FAR_BELOW);
  }
  return q < 0 ? -value : value;
}

function rational(r: number, coefficients: readonly number[]): number {
  let sum = 0;
  for (let i = coefficients.length - 1; i >= 0; i--) sum = sum * r + coefficients[i];
  return sum;
}

const CENTRE_ABOVE = [
  3.3871328727963665, 133.14166789178438, 1971.5909503065513, 13731.69376550946, 45921.95393154987,
  67265.7709270087, 33430.57558358813, 2509.0809287301227,
];
const CENTRE_BELOW = [
  1, 42.31333070160091, 687.1870074920579, 5394.196021424751, 21213.794301586597, 39307.89580009271,
  28729.085735721943, 5226.495278852546,
];
const MIDDLE_ABOVE = [
  1.4234371107496835, 4.630337846156546, 5.769497221460691, 3.6478483247632045, 1.2704582524523684,
  0.2417807251774506, 0.022723844989269184, 0.0007745450142783414,
];
const MIDDLE_BELOW = [
  1, 2.053191626637759, 1.6763848301838038, 0.6897673349851, 0.14810397642748008, 0.015198666563616457,
  0.0005475938084995345, 1.0507500716444169e-9,
];
const FAR_ABOVE = [
  6.657904643501103, 5.463784911164114, 1.7848265399172913, 0.29656057182850487, 0.026532189526576124,
  0.0012426609473880784, 2.7115555687434876e-5, 2.0103343992922881e-7,
];
const FAR_BELOW = [
  1, 0.599832206555888, 0.1369298809227358, 0.014875361290850615, 0.0007868691311456133,
  1.8463183175100548e-5, 1.421511758316446e-7, 2.0442631033899397e-15,
];

/** Chance that a standard normal value is at most `z`, to about 1e-15 absolute (series and continued fraction). */
export function normalProbability(z: number): number {
  const x = Math.abs(z);
  if (x > 38) return z < 0 ? 0 : 1;
  const density = Math.exp(-0.5 * x * x) / Math.sqrt(2 * Math.PI);
  let tail: number;
  if (x < 2.5) {
    // Φ(x) − ½ = φ(x) (x + x³/3 + x⁵/(3·5) + …)
    let term = x;
    let sum = x;
    for (let k = 3; term > 1e-17 * sum; k += 2) {
      term *= (x * x) / k;
      sum += term;
    }
    tail = 0.5 - density * sum;
  } else {
    // Mills' ratio as the continued fraction 1/(x + 1/(x + 2/(x + …)))
    let fraction = 0;
    for (let k = 80; k >= 1; k--) fraction = k / (x + fraction);
    tail = density / (x + fraction);
  }
  return z < 0 ? tail : 1 - tail;
}
