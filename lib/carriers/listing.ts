/** Listing within bounds: how much there is to list is looked at first. */
import type { Meter } from "../logic/meter.ts";
import type { Carrier } from "./carrier.ts";

/** Extensions of one configuration, and configurations that kinds are numbered by, that are listed at most. */
export const MOST_LISTED = 200_000;

/**
 * The extensions of a configuration of so many elements.
 * @param meter on an infinite carrier, counts a thousandth of a step for each; ends with the reason `memory` when they
 *   may be more than {@link MOST_LISTED}
 * @throws WorkEnded
 */
export function listExtensions<Configuration>(
  carrier: Carrier<Configuration>,
  configuration: Configuration,
  named: number,
  toCome: number,
  meter: Meter,
): readonly Configuration[] {
  if (carrier.size !== null) return carrier.extensions(configuration, toCome);
  if (carrier.mostExtensions(named, toCome) > MOST_LISTED) meter.endForMemory();
  const extensions = carrier.extensions(configuration, toCome);
  meter.charge(extensions.length);
  return extensions;
}

/** A bound on how many configurations of so many elements are listed one after another from the empty one. */
export function mostConfigurations(carrier: Carrier, length: number): number {
  let most = 1;
  for (let named = 0; named < length; named += 1) most *= carrier.mostExtensions(named, length - 1 - named);
  return most;
}

/** How many kinds of tuples there are; infinite when they cannot be listed within {@link MOST_LISTED}. */
export function countKinds(carrier: Carrier, length: number): number {
  if (carrier.size === null && mostConfigurations(carrier, length) > MOST_LISTED) return Infinity;
  return carrier.kindCount(length);
}
