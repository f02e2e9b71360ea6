// Made by `npm run bench -- drift-boundaries`: quantile regressions on simulated stable series, see boundaryTable.ts.
// Columns are the features of boundaryFeatures.ts, in its order.

/** False-alarm rates the table was fitted for. */
export const tabulatedRates: readonly number[] = [0.01, 0.02, 0.05, 0.1, 0.2];

/** Numbers of looks the table was fitted for. */
export const tabulatedLooks: readonly number[] = [8, 13, 26, 52, 104];

interface Coefficients {
  /** Without trend and season: for each rate, for each kind. */
  readonly plain: readonly Readonly<Record<string, readonly number[]>>[];
  /** With trend or season, at 5 %. */
  readonly terms: Readonly<Record<string, readonly number[]>>;
}

export const coefficients: Coefficients = {
  plain: [
    {
      level: [3.648, -0.167, -4.921, -0.627, 0.226, -3.023, 0.021, -0.23, 1.914, 0.84, 0.123],
      persistence: [2.949, 0.269, 0.977, -4.905, 0.814, -5.356, 0.051, 0.052, -1.81, -0.011, -0.243],
      "shock-size": [4.282, 0.274, -4.842, 6.745, 1.25, -3.68, -0.033, -0.308, -3.054, 3.557, 0.241],
    },
    {
      level: [4.719, -0.871, -10.198, 9.632, 1.592, -8.661, -0.151, -0.553, 3.851, 1.764, 0.327],
      persistence: [4.095, 0.162, 0.576, -5.909, 1.149, -6.653, -0.081, -0.208, -1.041, 1.864, -0.438],
      "shock-size": [6.013, 0.523, -2.688, 2.586, 1.08, -1.69, -0.089, -0.561, -6.939, 3.587, -0.388],
    },
    {
      level: [2.355, -0.174, -0.237, -6.97, -0.131, -0.237, 0.027, -0.135, 0.708, 0.094, 0.021],
      persistence: [1.674, 0.062, 0.034, -1.639, 0.983, -4.375, 0.004, 0.049, -1.337, -0.193, -0.065],
      "shock-size": [2.774, 0.017, -0.244, -1.383, 0.509, -0.406, -0.02, -0.192, -1.601, 2.148, 0.242],
    },
    {
      level: [1.8, -0.065, -0.435, -5.454, -0.012, -0.213, 0.02, -0.097, 0.366, 0.381, -0.018],
      persistence: [1.215, 0.075, -0.136, -1.012, 0.773, -3.249, 0.005, 0.007, -0.981, -0.147, -0.048],
      "shock-size": [2.189, 0.097, -0.984, 1.172, 0.421, -1.357, -0.021, -0.176, -1.336, 2.012, 0.079],
    },
    {
      level: [1.221, 0.005, 0.124, -5.149, 0.018, 0.391, 0.005, -0.097, 0.182, 0.5, -0.026],
      persistence: [0.856, -0.001, 0.115, -1.119, 0.512, -2.334, -0.002, 0.02, -0.738, -0.16, -0.038],
      "shock-size": [1.618, 0.049, -0.524, 0.689, 0.327, -1.289, -0.02, -0.139, -1.155, 1.565, -0.024],
    },
  ],
  terms: {
    level: [2.355, -0.174, -0.237, -6.97, -0.131, -0.237, 0.027, -0.135, 0.708, 0.094, 0.021, 0, 0, 0, 0, 0],
    persistence: [
      1.674, 0.062, 0.034, -1.639, 0.983, -4.375, 0.004, 0.049, -1.337, -0.193, -0.065, 0, 0, 0, 0, 0,
    ],
    "shock-size": [
      2.774, 0.017, -0.244, -1.383, 0.509, -0.406, -0.02, -0.192, -1.601, 2.148, 0.242, 0, 0, 0, 0, 0,
    ],
    trend: [2.355, -0.174, -0.237, -6.97, -0.131, -0.237, 0.027, -0.135, 0.708, 0.094, 0.021, 0, 0, 0, 0, 0],
    season: [2.355, -0.174, -0.237, -6.97, -0.131, -0.237, 0.027, -0.135, 0.708, 0.094, 0.021, 0, 0, 0, 0, 0],
  },
};

/** Added to each kind's boundary at 52 looks for the tabulated numbers of looks. */
export const lookShifts: Readonly<Record<string, readonly number[]>> = {
  level: [0, 0, 0, 0, 0.17],
  persistence: [0, 0, 0, 0, 0.317],
  "shock-size": [0, 0, 0, 0, 0.473],
};
