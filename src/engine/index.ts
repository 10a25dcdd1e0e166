// The engine's one door.

export { type FrequencyRange, type Source, imagesOf, resolveFrequency } from './ambiguity';
export { bandCheck, bandGap, bandInverted, bandMargin, bandZone, imageHigh, imageLow } from './band';
export { Fault, faults } from './fault';
export { type Sampling, foldedFrequency, frequencyZone, isInverted } from './folding';
export { type BrokenRule, type Conflict, type PlanRange, type RankedRate, conflicts, headroom, planRates, rankRates } from './plan';
export { type Plan, type Role } from './rules';
export { type RateRange, clockTolerance, lowestRate, usableRates } from './single-band-rates';
