// The engine's one door.

export { type FrequencyRange, type Source, imagesOf, resolveFrequency } from './ambiguity';
export { bandCheck, bandGap, bandInverted, bandMargin, bandZone, imageHigh, imageLow } from './band';
export { type ChainStage, downConvert, tunedFrequency, tuningWord } from './chain';
export { type ClockRate, clockRates } from './clock-rates';
export { coherentCycles, coherentFrequency } from './coherent';
export { Fault, faults, inRow } from './fault';
export { type Edges, type Response, filterAttenuation, filterOrder } from './filter';
export { type Forbidding, type ForbiddenRates, forbiddenRates } from './forbidden';
export { type Sampling, foldedFrequency, frequencyZone, isInverted } from './folding';
export { type Hold, type OutputImage, holdLevel, outputImages } from './hold';
export { effectiveBits, foldedNoise, jitterLimit, jitterSnr, quantizationSnr, sumSnr } from './noise';
export { type BrokenRule, type Conflict, type PlanRange, type RankedRate, conflicts, headroom, planRates, rankRates } from './plan';
export { type Product, type Suspect, intermodulation, suspectsOf } from './products';
export { type Plan, type Role } from './rules';
export { type RateRange, clockTolerance, lowestRate, usableRates } from './single-band-rates';
export { type Harmonic, type InterleavingSpur, type MixingProduct, harmonicsOf, interleavingSpurs, mixingProducts } from './spurs';
export { type StopEdge, stopEdges } from './stop-band';
