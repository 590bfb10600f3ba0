export { allocate, type WeightedKey } from './apportionment/allocate.ts'
export { divideHalfEven } from './apportionment/divide-half-even.ts'
export { formatAmount, formatMoney, formatPlainAmount, parseAmount } from './currency/amount-text.ts'
export { minorUnits } from './currency/minor-units.ts'
export { calculateDistribution } from './distribution/calculate-distribution.ts'
export { assertClosed, checkClosed, type ClosureFault } from './distribution/check-closed.ts'
export {
  type Distribution,
  type DistributionLine,
  type DistributionTotals,
  type Holdback,
  type HoldbackReason,
  type Pool,
  type StationDistribution,
  type SubjectAmount,
  type SubjectKind,
} from './distribution/distribution.ts'
export { explainHoldback } from './distribution/holdback-reasons.ts'
export {
  type DistributionInput,
  type DistributionRules,
  type LicenceInput,
  type PlayInput,
  type Right,
  type ShareInput,
} from './distribution/input.ts'
export { serialiseDistribution } from './distribution/serialise-distribution.ts'
export {
  applyDeductions,
  type DeductedAmount,
  type DeductionLine,
  type DeductionRule,
  WHOLE_PPM,
} from './fees/apply-deductions.ts'
export { proRataByDays } from './fees/pro-rata-by-days.ts'
export { RoyaltyError, type RoyaltyErrorCode } from './royalty-error.ts'
export { buildStatements } from './statement/build-statements.ts'
export {
  type Payee,
  type RightsAmount,
  type Statement,
  type StatementStation,
} from './statement/statement.ts'
