/** A configuration of each kind, on any carrier. */
import type { Carrier } from "./carrier.ts";
import { Listed } from "./listed.ts";

/** A configuration of each kind of tuples of that length, in the order of their numbers. */
export function kindExamplesOf(carrier: Carrier, length: number): readonly unknown[] {
  if (carrier instanceof Listed) return carrier.kindExamples(length);
  const places = Array.from({ length }, (_, place) => place);
  const examples: unknown[] = [];
  const extend = (configuration: unknown, left: number): void => {
    if (left > 0) for (const next of carrier.extensions(configuration, left - 1)) extend(next, left - 1);
    else examples[carrier.kindOf(configuration, places)] ??= configuration;
  };
  extend(carrier.empty, length);
  return examples;
}
