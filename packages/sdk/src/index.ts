export * from './contract.js';
export { RillageError, describeIssue, type Issue } from './errors.js';

export { runColumn, resumeColumn } from './column/index.js';
export { FORM_NAMES, selectionShare } from './selection/index.js';

export * from './reading/index.js';

export { guessLayout, type LayoutGuess } from './forcing/guessLayout.js';
export { readForcing, readSampleFiles, type ForcingRead } from './forcing/readForcing.js';
export { rerunReceipt } from './forcing/rerunReceipt.js';
export { checkForcing } from './forcing/checkForcing.js';
export type * from './forcing/layout.js';
export { fillRainConcentration, type RainFill, type RainFillOptions } from './forcing/rain/fillRainConcentration.js';
export { degreeDaySnow, type SnowInput, type SnowRun } from './forcing/complete/degreeDaySnow.js';
export { hargreaves } from './forcing/complete/hargreaves.js';
export { penmanMonteith, type WeatherDay } from './forcing/complete/penmanMonteith.js';
export { extraterrestrialRadiation } from './forcing/complete/radiation.js';
export { limitByStorage, type RootZone } from './forcing/complete/limitByStorage.js';
export { waterBalance, type WaterBalance } from './forcing/complete/waterBalance.js';
export { runColumnInBackground, type BackgroundOptions } from './workers/runColumnInBackground.js';

export { distributionOver, shareAt, shareOver, type WindowOptions, type WindowShare } from './ages/windows.js';
export { residenceTimes } from './ages/residence.js';
export { forwardDistribution, type ForwardDistribution } from './ages/forward.js';
export { makeSection, sectionSteps, type Section, type SectionColumn, type SectionOptions } from './ages/section.js';

export { fitCatchment, type FitCatchmentOptions } from './workers/fitCatchment.js';
export { whatWouldHelp, type HelpOptions } from './workers/whatWouldHelp.js';
export { runDrawsInBackground, type DrawsOptions } from './workers/runDrawsInBackground.js';
export type { Help } from './fit/whatWouldHelp.js';
export { catchmentsOf, fitMembers, runDraws, type FitMember } from './fit/draws.js';
export type { AlternativeAges, Fit, FitState, FittedAlternative, Predictive, Quantiles } from './fit/fit.js';
export { fitSummary, type FitSummary } from './fit/summary.js';
export type { FitOptions } from './fit/fitWith.js';
export type { Filling, FitProblem, WithPriors } from './fit/problem.js';
export type { ParameterDiagnosis, TracerDiagnosis } from './fit/diagnosis.js';
export type { Comparison, CrossCheck } from './fit/crossCheck.js';
export type { Prior } from './fit/priors.js';
export type { ErrorModel } from './fit/likelihood.js';
