export { type Criterion, criterionWeights } from "./autoregression/criteria.ts";
export { dickeyFullerTest } from "./autoregression/dickeyFuller.ts";
export {
  dickeyFullerCriticalValues,
  dickeyFullerGlsCriticalValues,
  dickeyFullerPValue,
} from "./autoregression/dickeyFullerDistribution.ts";
export type { AutoregressiveFit, AutoregressiveProcess, EstimationMethod } from "./autoregression/fit.ts";
export { type FitOptions, fitAutoregression } from "./autoregression/fitAutoregression.ts";
export { fullerCriticalValues, fullerPValue } from "./autoregression/fullerTables.ts";
export { generalisedLeastSquares } from "./autoregression/generalisedLeastSquares.ts";
export { archTest, breuschGodfrey } from "./autoregression/lagrangeTests.ts";
export { ljungBox, mcLeodLi } from "./autoregression/ljungBox.ts";
export { logLikelihood } from "./autoregression/logLikelihood.ts";
export {
  coefficientsToPartials,
  isStationary,
  partialsToCoefficients,
} from "./autoregression/partials.ts";
export { type Prediction, predict } from "./autoregression/predict.ts";
export {
  constantColumn,
  eventColumn,
  harmonicColumns,
  seasonalColumns,
  stepColumn,
  trendColumn,
} from "./autoregression/regressionTerms.ts";
export { durbinWatson, jarqueBera } from "./autoregression/residualShape.ts";
export { partialAutocorrelations, sampleAutocovariances } from "./autoregression/sampleMoments.ts";
export { type OrderSelection, selectOrder } from "./autoregression/selectOrder.ts";
export { smoothGaps } from "./autoregression/smoothGaps.ts";
export { type UnitRootTest, unitRootTest } from "./autoregression/unitRootTest.ts";
export { advanceMonitor } from "./drift/advanceMonitor.ts";
export { compareFits, type FitComparison } from "./drift/compareFits.ts";
export { type BreakOptions, type Breaks, findBreaks } from "./drift/findBreaks.ts";
export type { PastBreak } from "./drift/lastBreak.ts";
export type { Monitor, MonitorSettings } from "./drift/monitor.ts";
export { type MonitorPath, monitorPaths } from "./drift/monitorPaths.ts";
export type {
  Behaviour,
  ChangeKind,
  ChangeNotice,
  Evidence,
  Notice,
  SurpriseNotice,
} from "./drift/notice.ts";
export { type StartOptions, startMonitor } from "./drift/startMonitor.ts";
export { readWatch } from "./drift/storedWatch.ts";
export {
  type Watch,
  type WatchOptions,
  type WatchResult,
  type WatchState,
  watchSeries,
} from "./drift/watchSeries.ts";
export { autocovariances } from "./dynamics/autocovariances.ts";
export { characteristicRoots, rhythm } from "./dynamics/characteristicRoots.ts";
export { biasCorrected, firstOrderBias } from "./dynamics/firstOrderBias.ts";
export { halfLife } from "./dynamics/halfLife.ts";
export { type HalfLifeInterval, halfLifeInterval } from "./dynamics/halfLifeInterval.ts";
export {
  coefficientInterval,
  leastSquaresMean,
  leastSquaresQuantile,
  medianUnbiased,
} from "./dynamics/leastSquaresDistribution.ts";
export { longRun, spectralDensity } from "./dynamics/longRun.ts";
export { movingAverageWeights } from "./dynamics/movingAverageWeights.ts";
export { cumulativeResponse, persistence } from "./dynamics/persistence.ts";
export { type ShockContributions, shockContributions } from "./dynamics/shockContributions.ts";
export { type ShockFading, shockFading } from "./dynamics/shockFading.ts";
export { accuracy } from "./forecast/accuracy.ts";
export { describeSeries } from "./forecast/describingModel.ts";
export type { Forecast, ForecastOptions } from "./forecast/forecast.ts";
export { forecastSeries } from "./forecast/forecastSeries.ts";
export { SettingsError } from "./job/loadSettings.ts";
export { NoTablesError } from "./job/noTables.ts";
export { planRun } from "./job/plan.ts";
export type { Progress } from "./job/progress.ts";
export { type RefitOptions, refitPortion } from "./job/refit.ts";
export { dueRuns, replayRuns } from "./job/replay.ts";
export { closeRun, OutdatedRunError, type RunOptions, runJob } from "./job/run.ts";
export type { Settings, SettingsInput } from "./job/settings.ts";
export type { DeliveryRecord, FailedTable, Plan, PortionResult, RunSummary } from "./job/summary.ts";
export type { Secrets, Webhook, WebhookInput } from "./job/webhooks.ts";
export { levinson } from "./numeric/levinson.ts";
export { compareReadings, type EarlierReading, type Revisions } from "./series/compareReadings.ts";
export { currentPeriod } from "./series/currentPeriod.ts";
export { type EventColumn, type EventColumnOptions, eventColumns } from "./series/eventColumns.ts";
export { periodIndex, periodStart } from "./series/periods.ts";
export { periodsLate } from "./series/periodsLate.ts";
export { publicHolidays } from "./series/publicHolidays.ts";
export { type KnownEvent, readEvents } from "./series/readEvents.ts";
export type { Reading } from "./series/reading.ts";
export { readTable } from "./series/readTable.ts";
export { readTableStream } from "./series/readTableStream.ts";
export type { Period, Problem, Series } from "./series/series.ts";
export type { ReadContext, TableResult } from "./series/tableResult.ts";
export type { TableSettings } from "./series/tableSettings.ts";
export type { ObjectEntry, ObjectStore, StoredObject } from "./store/objectStore.ts";
export { StoreError } from "./store/objectStore.ts";
export { openStore, type StoreEnvironment } from "./store/openStore.ts";
export { type ComposedBody, composeBody } from "./webhook/composeBody.ts";
export { type Delivery, type DeliveryOutcome, deliver } from "./webhook/deliver.ts";
export type { BodyShape, Message } from "./webhook/message.ts";
export { type SignatureInput, signatureHeaders } from "./webhook/signatureHeaders.ts";
