/** Figures that the organisation is not asked for; each says where it comes from. */

/** Getting out of the van, signing the book, walking to the gate. Common practice, no source. */
export const ARRIVAL_S = 300;
/** Loading the van and reading the sheet before a round. Common practice, no source. */
export const LOADING_S = 900;
/** How far a return may lie beyond the shift's end. Common practice, no source. */
export const OVERTIME_S = 1800;
/** Stops of a usual round, for the share of a drive that a later visit would pay. */
export const STOPS_OF_A_ROUND = 8;
/** Hours until an urgent trip reaches a site, silence running meanwhile. */
export const URGENT_RESPONSE_H = 24;
/** Hours until the next weekly plan brings somebody to a device that has stopped. */
export const NEXT_ROUND_H = 7 * 24;
/**
 * Spread of ln(life) of packs still to come, by which the long-run cost of service is reckoned:
 * 8 % of capacity and 15 % of draw together, as a forecast assumes them before anything is read.
 */
export const FUTURE_LIFE_SD = 0.17;
/**
 * How many times its reckoned long-run cost a day of service is held to cost. Measured in simulated
 * years (README.md), no theory: more than 1, because what a swap brings forward is reckoned from
 * its own expected life, and the packs to come will be taken out early again.
 */
export const KEEP_FACTOR = 1.25;
/** What an urgent trip costs beside its own drive and work: a planned round is torn up. */
export const URGENT_DISRUPTION_H = 1;
/**
 * A pack whose best later visit lies further ahead than this after the plan is left for later:
 * new voltages will say more by then. Common practice, no source.
 */
export const NEAR_DAYS = 56;
/** How far ahead a later visit is looked for: beyond the life of the longest-lived packs. */
export const LATER_DAYS = 15 * 365;
/**
 * A plan also looks at the days after its own: what is better done there, with company, waits.
 * Only its own days become rounds. Measured; see README.md.
 */
export const LOOK_AHEAD_DAYS = 7;
/** Visit, drive and overtime are priced in thousandths of a minor unit: rounding stays unseen. */
export const COST_UNITS_A_MINOR = 1000;
/**
 * A changed day or technician of a published visit: a message, a phone call, somebody's diary.
 * Common practice, no source.
 */
export const CHANGE_MINOR = { day: 1200, technician: 600, drop: 1200 } as const;
