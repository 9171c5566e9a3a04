/** Settings of the search. The defaults were tuned on public instances; see README.md. */
export interface Params {
  /** Mean number of stops taken out by a ruin, and the longest string taken from one route. */
  readonly meanRemoved: number;
  readonly longestString: number;
  /** Share of strings that keep a part inside, and the chance to lengthen that part by one. */
  readonly splitShare: number;
  readonly splitGrowth: number;
  /** Share of insertion positions passed over. */
  readonly blinkShare: number;
  /** Stops in the plan above which an insertion looks at the routes of near sites alone. */
  readonly nearby: number;
  /** Share of turns that empty a whole route, and that open an empty slot. */
  readonly closeShare: number;
  readonly openShare: number;
  /** Sites left out that each turn tries to bring in, at least: a mean route's worth if longer. */
  readonly absentTried: number;
  /** Sites left out that a newly opened slot is offered, at least: four mean routes' worth. */
  readonly openOffer: number;
  /** How many times its price an absence counts in the start plan: opens routes that single
   * insertions would not pay for. */
  readonly startWorth: number;
  /**
   * Temperatures as multiples of the start plan's mean price of a leg: the first per ten stops of
   * its mean route, the last as it is.
   */
  readonly startHeat: number;
  readonly endHeat: number;
  /** Turns between two looks at the stop function. */
  readonly stride: number;
}

export const DEFAULT_PARAMS: Params = {
  meanRemoved: 10,
  longestString: 10,
  splitShare: 0.5,
  splitGrowth: 0.5,
  blinkShare: 0.01,
  nearby: 250,
  closeShare: 0.02,
  openShare: 0.03,
  absentTried: 12,
  openOffer: 40,
  startWorth: 4,
  startHeat: 1,
  endHeat: 0.03,
  stride: 64,
};
