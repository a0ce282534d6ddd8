import type { Component } from '../fit/index.js';
import type { Message } from '../logs/index.js';
import type { DayCondition } from './dayConditions.js';
import type { GuiltyPart } from './dayParts.js';
import type { OffsetTest } from './setupOffsets.js';

/** Chance at which a setup or a circumstance is called out of the ordinary, over all tests made. */
export const LEVEL = 0.05;

/** What a degraded day is put down to. */
export type DayVerdict =
  | 'bad setup'
  | 'one mark'
  | 'one crew'
  | 'one receiver'
  | 'grows with distance'
  | 'not explained';

/** A circumstance with its chance after as many tests as were made. */
export interface TestedCondition extends DayCondition {
  readonly adjustedP: number;
  readonly unusual: boolean;
}

/** An offset of a setup with its chance, and whether the day is ordinary without it. */
export interface TestedSetup extends OffsetTest {
  readonly setup: string;
  readonly adjustedP: number;
  /** How strongly the day says ordinary once the offset is taken out. */
  readonly restEvidence: number;
}

/** What speaks for and against causes on the ground, before the sky is blamed. */
export interface DayExplanation {
  readonly component: Component;
  readonly day: string;
  readonly factor: number;
  readonly probabilityDegraded: number;
  readonly occupations: number;
  readonly verdict: DayVerdict;
  /** Name of the setup, mark, crew or receiver. */
  readonly subject: string | null;
  readonly setups: readonly TestedSetup[];
  readonly mark: GuiltyPart | null;
  readonly crew: GuiltyPart | null;
  readonly receiver: GuiltyPart | null;
  /**
   * How many times as probable the errors are as growth with distance than as a larger error at every distance,
   * whichever mark is left out.
   */
  readonly growthEvidence: number;
  readonly conditions: readonly TestedCondition[];
  readonly note: Message;
}
