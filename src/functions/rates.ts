// The rates family: which sample rates are usable.

import { type BrokenRule, type Plan, clockRates, clockTolerance, conflicts as conflictsAt, headroom as headroomAt, lowestRate, planRates, rankRates, usableRates } from '../engine';
import { type Cells, count as howMany, eachRow, edges, headerRow, limit, number, optional, planRows, result, rowNames, samplingKind, single, table, vector } from './cells';

/**
 * Every range of sample rates that holds a band within one zone, ascending.
 * @customfunction RATES RATES
 * @param {any[][]} low Low edge of the band
 * @param {any[][]} high High edge of the band, not below low
 * @param {any[][]} [from] Lowest rate to list (default: as low as the band allows)
 * @param {any[][]} [to] Highest rate to list (default: unlimited)
 * @param {any[][]} [guard] Smallest clear distance wanted, 0 or more (default 0)
 * @param {any[][]} [ppm] How far the clock may be off either way, in parts per million (default 0)
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @param {any[][]} [headers] FALSE leaves the header row out
 * @returns {any[][]} Zone, Lowest rate, Highest rate (blank where unlimited), Width, Inverted
 */
export function rates(low: any[][], high: any[][], from?: any[][], to?: any[][], guard?: any[][], ppm?: any[][], sampling?: any[][], headers?: any[][]): any[][] {
  return table(headerRow(headers), ['Zone', 'Lowest rate', 'Highest rate', 'Width', 'Inverted'], () =>
    usableRates(
      single(number('low', low)), single(number('high', high)), single(optional('from', from, 0)), single(limit('to', to)),
      single(optional('guard', guard, 0)), single(optional('ppm', ppm, 0)), single(samplingKind(sampling)),
    ).map((range) => [range.zone, range.lowest, range.highest ?? '', range.width ?? '', range.inverted]));
}

/**
 * The lowest sample rate that holds a band within one zone.
 * @customfunction MINRATE MINRATE
 * @param {any[][]} low Low edge of the band; a cell or a column
 * @param {any[][]} high High edge of the band, not below low
 * @param {any[][]} [guard] Smallest clear distance wanted, 0 or more (default 0)
 * @param {any[][]} [ppm] How far the clock may be off either way, in parts per million (default 0)
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @returns {any[][]} Lowest rate
 */
export function minrate(low: any[][], high: any[][], guard?: any[][], ppm?: any[][], sampling?: any[][]): any[][] {
  return eachRow([...edges('low', low, 'high', high), optional('guard', guard, 0), optional('ppm', ppm, 0), samplingKind(sampling)], lowestRate);
}

/**
 * Parts per million by which the clock may be off either way before a band leaves its zone; 0 where it already does.
 * @customfunction TOLERANCE TOLERANCE
 * @param {any[][]} low Low edge of the band; a cell or a column
 * @param {any[][]} high High edge of the band, not below low
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [guard] Smallest clear distance wanted, 0 or more (default 0)
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @returns {any[][]} ppm
 */
export function tolerance(low: any[][], high: any[][], rate: any[][], guard?: any[][], sampling?: any[][]): any[][] {
  return eachRow([...edges('low', low, 'high', high), number('rate', rate), optional('guard', guard, 0), samplingKind(sampling)], clockTolerance);
}

/**
 * Every range of sample rates at which each wanted band of a plan lies within one zone and clear of all other images.
 * @customfunction PLANRATES PLANRATES
 * @param {any[][]} low Low edges, a column of the plan
 * @param {any[][]} high High edges, not below the low ones
 * @param {any[][]} [role] "wanted" (also blank), "unwanted" or "ignore" for each band
 * @param {any[][]} [from] Lowest rate to list (default: as low as the wanted widths allow)
 * @param {any[][]} [to] Highest rate to list (default: unlimited)
 * @param {any[][]} [guard] Smallest clear distance wanted, to zone edges and between images (default 0)
 * @param {any[][]} [ppm] How far the clock may be off either way, in parts per million (default 0)
 * @param {any[][]} [harmonics] Highest order of every band's harmonics to keep clear of, 1 to 20 (default 1: none)
 * @param {any[][]} [cores] Interleaved cores, 1 to 64 (default 1)
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @param {any[][]} [headers] FALSE leaves the header row out
 * @returns {any[][]} Lowest rate, Highest rate, Width, Centre (blank where unlimited), Headroom ppm
 */
export function planrates(low: any[][], high: any[][], role?: any[][], from?: any[][], to?: any[][], guard?: any[][], ppm?: any[][], harmonics?: any[][], cores?: any[][], sampling?: any[][], headers?: any[][]): any[][] {
  return table(headerRow(headers), ['Lowest rate', 'Highest rate', 'Width', 'Centre', 'Headroom ppm'], () =>
    planRates(planOf(low, high, role, guard, harmonics, cores, sampling), single(optional('from', from, 0)), single(limit('to', to)), single(optional('ppm', ppm, 0)))
      .map((range) => [range.lowest, range.highest ?? '', range.width ?? '', range.centre ?? '', range.headroom ?? '']));
}

/**
 * The best sample rates of a grid for a whole plan, those with most headroom first.
 * @customfunction RANKRATES RANKRATES
 * @param {any[][]} low Low edges, a column of the plan
 * @param {any[][]} high High edges, not below the low ones
 * @param {any[][]} grid One number, the step of the grid, or a range of rates
 * @param {any[][]} [role] "wanted" (also blank), "unwanted" or "ignore" for each band
 * @param {any[][]} [from] Lowest rate to consider (default: as low as the wanted widths allow)
 * @param {any[][]} [to] Highest rate to consider; needed where grid is a step
 * @param {any[][]} [guard] Smallest clear distance wanted, to zone edges and between images (default 0)
 * @param {any[][]} [ppm] How far the clock may be off either way, in parts per million (default 0)
 * @param {any[][]} [harmonics] Highest order of every band's harmonics to keep clear of, 1 to 20 (default 1: none)
 * @param {any[][]} [cores] Interleaved cores, 1 to 64 (default 1)
 * @param {any[][]} [count] How many rates to list (default 10)
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @param {any[][]} [headers] FALSE leaves the header row out
 * @returns {any[][]} Rate, Headroom ppm, Tightest gap, Tightest rule
 */
export function rankrates(low: any[][], high: any[][], grid: any[][], role?: any[][], from?: any[][], to?: any[][], guard?: any[][], ppm?: any[][], harmonics?: any[][], cores?: any[][], count?: any[][], sampling?: any[][], headers?: any[][]): any[][] {
  return table(headerRow(headers), ['Rate', 'Headroom ppm', 'Tightest gap', 'Tightest rule'], () => {
    const plan = planOf(low, high, role, guard, harmonics, cores, sampling);
    const rates = vector(number('grid', grid));
    return rankRates(
      plan, rates.length === 1 ? rates[0]! : rates, single(optional('from', from, 0)), single(limit('to', to)), single(optional('ppm', ppm, 0)), single(howMany('count', count, 10)),
    ).map(({ rate, headroom, gap, rule }) => [rate, headroom, gap, `${rowName(rule.band)}: ${inWords(rule, plan.cores)}${rule.against === null ? '' : ` against ${rowName(rule.against)}`}`]);
  });
}

/**
 * Every rule that a sample rate breaks for a plan, worst first; one row that says "clear" where none is broken.
 * @customfunction CONFLICTS CONFLICTS
 * @param {any[][]} low Low edges, a column of the plan
 * @param {any[][]} high High edges, not below the low ones
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [role] "wanted" (also blank), "unwanted" or "ignore" for each band
 * @param {any[][]} [guard] Smallest clear distance wanted, to zone edges and between images (default 0)
 * @param {any[][]} [ppm] How far the clock may be off either way, in parts per million (default 0)
 * @param {any[][]} [harmonics] Highest order of every band's harmonics to keep clear of, 1 to 20 (default 1: none)
 * @param {any[][]} [cores] Interleaved cores, 1 to 64 (default 1)
 * @param {any[][]} [name] Names of the bands, a column of the plan
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @param {any[][]} [headers] FALSE leaves the header row out
 * @returns {any[][]} Band, Rule, Against, Gap
 */
export function conflicts(low: any[][], high: any[][], rate: any[][], role?: any[][], guard?: any[][], ppm?: any[][], harmonics?: any[][], cores?: any[][], name?: any[][], sampling?: any[][], headers?: any[][]): any[][] {
  return table(headerRow(headers), ['Band', 'Rule', 'Against', 'Gap'], () => {
    const plan = planOf(low, high, role, guard, harmonics, cores, sampling);
    const names = rowNames('name', name, 'low', plan.low.length, rowName);
    const broken = conflictsAt(plan, single(number('rate', rate)), single(optional('ppm', ppm, 0)));
    if (broken.length === 0) return [['', 'clear', '', '']];
    return broken.map((rule) => [names[rule.band]!, inWords(rule, plan.cores), rule.against === null ? rule.at! : names[rule.against]!, rule.gap]);
  });
}

/**
 * Parts per million by which a sample rate may move either way before a plan breaks a rule; 0 where it breaks one.
 * @customfunction HEADROOM HEADROOM
 * @param {any[][]} low Low edges, a column of the plan
 * @param {any[][]} high High edges, not below the low ones
 * @param {any[][]} rate Sample rate, above 0
 * @param {any[][]} [role] "wanted" (also blank), "unwanted" or "ignore" for each band
 * @param {any[][]} [guard] Smallest clear distance wanted, to zone edges and between images (default 0)
 * @param {any[][]} [harmonics] Highest order of every band's harmonics to keep clear of, 1 to 20 (default 1: none)
 * @param {any[][]} [cores] Interleaved cores, 1 to 64 (default 1)
 * @param {any[][]} [sampling] "real" (default) or "iq"
 * @returns {any[][]} ppm
 */
export function headroom(low: any[][], high: any[][], rate: any[][], role?: any[][], guard?: any[][], harmonics?: any[][], cores?: any[][], sampling?: any[][]): any[][] {
  return result(() => headroomAt(planOf(low, high, role, guard, harmonics, cores, sampling), single(number('rate', rate))));
}

/**
 * The rates that a clock tree can make of its reference: reference·N/D in a range, in lowest terms.
 * @customfunction CLOCKRATES CLOCKRATES
 * @param {any[][]} reference Frequency of the reference, above 0
 * @param {any[][]} from Lowest rate to list
 * @param {any[][]} to Highest rate to list
 * @param {any[][]} [multiply] Highest N, 1 to 10000 (default 16)
 * @param {any[][]} [divide] Highest D, 1 to 10000 (default 16)
 * @param {any[][]} [headers] FALSE leaves the header row out
 * @returns {any[][]} Rate, N, D
 */
export function clockrates(reference: any[][], from: any[][], to: any[][], multiply?: any[][], divide?: any[][], headers?: any[][]): any[][] {
  return table(headerRow(headers), ['Rate', 'N', 'D'], () =>
    clockRates(
      single(number('reference', reference)), single(number('from', from)), single(number('to', to)), single(howMany('multiply', multiply, 16)), single(howMany('divide', divide, 16)),
    ).map(({ rate, n, d }) => [rate, n, d]));
}

function planOf(low: Cells, high: Cells, role: Cells, guard: Cells, harmonics: Cells, cores: Cells, sampling: Cells): Plan {
  return {
    ...planRows(low, high, role), guard: single(optional('guard', guard, 0)), harmonics: single(howMany('harmonics', harmonics, 1)),
    cores: single(howMany('cores', cores, 1)), sampling: single(samplingKind(sampling)),
  };
}

const rowName = (row: number): string => `row ${row + 1}`;

/** A rule as a cell names it: `zone edge`, `band`, `harmonic 3`, `image 1/4`, `offset 1/4`. */
function inWords({ kind, order, beforeSampling }: BrokenRule, cores: number): string {
  const words = { 'zone edge': 'zone edge', band: 'band', harmonic: `harmonic ${order}`, image: `image ${order}/${cores}`, offset: `offset ${order}/${cores}` }[kind];
  return beforeSampling ? `${words}, before sampling` : words;
}
