// The engine's one door.

export { type FrequencyRange, type Source, imagesOf, resolveFrequency } from './ambiguity';
export { bandCheck, bandGap, bandInverted, bandMargin, bandZone, imageHigh, imageLow } from './band';
export { Fault, faults } from './fault';
export { type Sampling, foldedFrequency, frequencyZone, isInverted } from './folding';
export { type RateRange, clockTolerance, lowestRate, usableRates } from './single-band-rates';
