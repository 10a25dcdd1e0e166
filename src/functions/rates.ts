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
 * @formula in zone z from 2·high/z to 2·low/(z − 1), each moved in by guard and tolerance
 * @source Vaughan, Scott and White, The theory of bandpass sampling, IEEE Trans. Signal Processing 39(9), 1991
 * @example =FOLD.RATES(17.5, 22.5, 11, 40) =>
 *   Zone | Lowest rate | Highest rate | Width | Inverted
 *   4 | 11.25 | 11.6666666666666 | 0.4166666666666 | TRUE
 *   3 | 15 | 17.5 | 2.5 | FALSE
 *   2 | 22.5 | 35 | 12.5 | TRUE
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
 * @formula 2·high/⌊high/width⌋ without guard and tolerance
 * @source Vaughan, Scott and White, 1991
 * @example =FOLD.MINRATE(17.5, 22.5) => 11.25
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
 * @formula the least relative change of the rate that takes the margin to 0
 * @source the definition of this add-in
 * @example =FOLD.TOLERANCE(60, 90, 100) => 100000
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
 * @formula all rates but those at which a multiple of fs (of fs/cores) falls between the bounds that a zone edge or another image sets
 * @source the rule of bandpass sampling, applied to sums and differences of bands
 * @example =FOLD.PLANRATES({10;60}, {12;62}, {"wanted";"unwanted"}, 30, 100, 0.5) =>
 *   Lowest rate | Highest rate | Width | Centre | Headroom ppm
 *   30 | 34.75 | 4.75 | 32.375 | 73359.0733590733
 *   37.25 | 47.5 | 10.25 | 42.375 | 120943.952802359
 *   52.5 | 69.5 | 17 | 61 | 139344.262295081
 *   74.5 | 100 | 25.5 | 87.25 | 146131.805157593
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
 * @formula the rates of the grid that PLANRATES allows, by the relative distance to the nearest bound
 * @source as PLANRATES
 * @example =FOLD.RANKRATES({10;60}, {12;62}, 5, {"wanted";"unwanted"}, 30, 90, 0.5, , , , 3) =>
 *   Rate | Headroom ppm | Tightest gap | Tightest rule
 *   90 | 172222.222222222 | 10 | row 1: zone edge
 *   30 | 125000 | 3 | row 1: zone edge
 *   60 | 125000 | 8 | row 1: band against row 2
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
 * @formula every rule of PLANRATES at one rate; the gap is negative by what an image would have to move
 * @source as PLANRATES
 * @example =FOLD.CONFLICTS({10;60}, {12;62}, 72, {"wanted";"unwanted"}, 0.5, , , , {"Beacon";"Blocker"}) =>
 *   Band | Rule | Against | Gap
 *   Beacon | band | Blocker | -2
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
 * @formula the relative distance from the rate to the nearest bound of PLANRATES, in ppm
 * @source as PLANRATES
 * @example =FOLD.HEADROOM({10;60}, {12;62}, 80, {"wanted";"unwanted"}, 0.5) => 68750
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
 * @formula reference·N/D in lowest terms
 * @source common practice of phase-locked loops
 * @example =FOLD.CLOCKRATES(10, 30, 50, 10, 2) =>
 *   Rate | N | D
 *   30 | 3 | 1
 *   35 | 7 | 2
 *   40 | 4 | 1
 *   45 | 9 | 2
 *   50 | 5 | 1
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
