import { requireCount } from '../proportion/counts';
import { isMeasure, requireRange } from '../result';

/** Events over person-time, with the unit to report in: `per: 100` gives a rate per 100 units of person-time. */
export interface OneRate {
  readonly events: number;
  readonly personTime: number;
  /** 1 unless given. */
  readonly per?: number;
  readonly level?: number;
}

/** Two independent rates; the estimands compare rate 1 with rate 2. */
export interface TwoRates {
  readonly events1: number;
  readonly personTime1: number;
  readonly events2: number;
  readonly personTime2: number;
  readonly level?: number;
}

/** Person-time is positive and finite. Throws RangeError otherwise. */
export function requirePersonTime(value: number): void {
  requireRange(value > 0 && isMeasure(value), `Person-time is a positive number, not ${value}.`);
}

export function requireOneRate({ events, personTime, per = 1 }: OneRate): void {
  requireCount(events, 'The number of events');
  requirePersonTime(personTime);
  requireRange(per > 0 && per < Number.POSITIVE_INFINITY, `A rate is reported per a positive amount, not ${per}.`);
}

export function requireTwoRates({ events1, personTime1, events2, personTime2 }: TwoRates): void {
  requireCount(events1, 'The number of events');
  requireCount(events2, 'The number of events');
  requirePersonTime(personTime1);
  requirePersonTime(personTime2);
}

export const NO_EVENTS = 'Neither group has an event.';
