/** A condition of a standard, and whether the data meet it. */
export interface StandardCondition {
  readonly text: string;
  /** Null: the data do not tell. */
  readonly met: boolean | null;
}

/** What every comparison with a standard says first. */
export interface StandardHead {
  readonly standard: string;
  readonly definition: string;
  readonly conditions: readonly StandardCondition[];
  /** Definitions are recalled: the printed standard decides. */
  readonly caution: string;
}

export const FROM_MEMORY =
  'Definition and conditions are given from memory: the printed standard decides, and this is no certificate of conformity.';
