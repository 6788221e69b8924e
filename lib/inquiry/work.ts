/** What a question may spend and whom it tells how far it is. */
import { DEFAULT_BUDGET, Meter, type Poll } from "../logic/meter.ts";

/** Sizes that a search for finite structures goes through when the user does not say. */
export const DEFAULT_LARGEST_SIZE = 8;
/** Sizes up to which it goes on with symmetric structures alone when the user does not say. */
export const DEFAULT_LARGEST_SYMMETRIC_SIZE = 20;

/** How a question is to be worked on. Nothing in an answer depends on the two functions. */
export interface Work {
  /** Steps for the whole question. */
  readonly budget: number;
  /** Sizes 1, 2, …, this many points are searched. */
  readonly upTo: number;
  /**
   * Beyond the sizes that were searched completely, symmetric structures are looked for on up to this many points; 0
   * for not beyond `upTo`.
   */
  readonly symmetricUpTo: number;
  /** Whether the user has asked to stop; polled often, with what the part of the question has spent. */
  readonly isInterrupted: Poll;
  /** Told what is being done, for people: "models on 7 points". */
  readonly report: (doing: string) => void;
}

/** Work with the default budget, on the default sizes and not beyond, which nobody watches. */
export const unwatchedWork: Work = {
  budget: DEFAULT_BUDGET,
  upTo: DEFAULT_LARGEST_SIZE,
  symmetricUpTo: 0,
  isInterrupted: () => false,
  report: () => undefined,
};

/** A meter for one of `shares` equal parts of a question, so that no part takes what is another's. */
export function meterFor(work: Work, shares = 1): Meter {
  return new Meter(Math.max(1, Math.floor(work.budget / shares)), work.isInterrupted);
}
