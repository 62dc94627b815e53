import { requireCount } from '../proportion/counts';
import { isMeasure, requireRange, type Estimate } from '../result';

/** Events over person-time, with the unit to report in: `per: 100` gives a rate per 100 units of person-time. */
export interface OneRate {
  readonly events: number;
  readonly personTime: number;
  /** People the person-time is of, for the result to name. */
  readonly people?: number;
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
  /** People in each group, for the result to name. */
  readonly people1?: number;
  readonly people2?: number;
  readonly level?: number;
}

/** What a rate answers. Events are counted apart from people: one person may have several. */
export interface RateResult extends Omit<Estimate, 'n'> {
  /** People whose person-time was used; null where they were not told. */
  readonly n: number | null;
  readonly events: number;
}

/** A ratio of rates by its log. */
export interface RateRatioEstimate extends RateResult {
  /** Standard error of the log ratio; null where it does not exist. */
  readonly standardErrorLog: number | null;
}

/** People of both groups; null unless both are told. */
export function peopleOf({ people1, people2 }: TwoRates): number | null {
  return people1 === undefined || people2 === undefined ? null : people1 + people2;
}

function requirePeople(people: number | undefined): void {
  if (people !== undefined) requireCount(people, 'The number of people');
}

/** Person-time is positive and finite. Throws RangeError otherwise. */
export function requirePersonTime(value: number): void {
  requireRange(value > 0 && isMeasure(value), `Person-time is a positive number, not ${value}.`);
}

/** A count, its positive person-time and what to report by. Throws RangeError otherwise. */
export function requireOneRate({ events, personTime, people, per = 1 }: OneRate): void {
  requireCount(events, 'The number of events');
  requirePersonTime(personTime);
  requirePeople(people);
  requireRange(per > 0 && per < Number.POSITIVE_INFINITY, `A rate is reported per a positive amount, not ${per}.`);
}

/** Two counts with their positive person-times. Throws RangeError otherwise. */
export function requireTwoRates({ events1, personTime1, events2, personTime2, people1, people2 }: TwoRates): void {
  requireCount(events1, 'The number of events');
  requireCount(events2, 'The number of events');
  requirePersonTime(personTime1);
  requirePersonTime(personTime2);
  requirePeople(people1);
  requirePeople(people2);
}

export const NO_EVENTS = 'Neither group has an event.';
