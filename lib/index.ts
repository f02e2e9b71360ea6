export { autocovariances } from "./autoregression/autocovariances.ts";
export { criterionWeights } from "./autoregression/criteria.ts";
export type { AutoregressiveFit, AutoregressiveProcess, EstimationMethod } from "./autoregression/fit.ts";
export { fitAutoregression } from "./autoregression/fitAutoregression.ts";
export { logLikelihood } from "./autoregression/logLikelihood.ts";
export {
  coefficientsToPartials,
  isStationary,
  partialsToCoefficients,
} from "./autoregression/partials.ts";
export { predict } from "./autoregression/predict.ts";
export { partialAutocorrelations, sampleAutocovariances } from "./autoregression/sampleMoments.ts";
export { selectOrder } from "./autoregression/selectOrder.ts";
export { halfLife } from "./dynamics/halfLife.ts";
export { movingAverageWeights } from "./dynamics/movingAverageWeights.ts";
export { cumulativeResponse, persistence } from "./dynamics/persistence.ts";
export { levinson } from "./numeric/levinson.ts";
