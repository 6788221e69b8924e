/** Listing within bounds: how much there is to list is looked at first. */
import type { Meter } from "../logic/meter.ts";
import type { Carrier } from "./carrier.ts";

/** Configurations that kinds are numbered by, at most. */
export const MOST_LISTED = 200_000;
/** Extensions of one configuration that are listed at most: all at once, so that an interrupt is seen soon. */
const MOST_EXTENSIONS = 40_000;

/** A configuration of an infinite carrier is as much work as so many visits to a subformula. */
const VISITS_EACH = 10;
/** Points that are listed without being counted. */
const FEW_POINTS = 1_000;

/**
 * The extensions of a configuration of so many elements.
 * @param meter counts ten thousandths of a step for each, on points one, and nothing for few points; ends with the reason `memory` when they may
 *   be more than {@link MOST_EXTENSIONS} and are not points
 * @throws WorkEnded
 */
export function listExtensions<Configuration>(
  carrier: Carrier<Configuration>,
  configuration: Configuration,
  named: number,
  toCome: number,
  meter: Meter,
): readonly Configuration[] {
  const isListed = !isOfPoints(carrier);
  if (isListed && carrier.mostExtensions(named, toCome) > MOST_EXTENSIONS) meter.endForMemory();
  const extensions = carrier.extensions(configuration, toCome);
  if (isListed) meter.charge(extensions.length * VISITS_EACH);
  else if (extensions.length > FEW_POINTS) meter.charge(extensions.length);
  return extensions;
}

/** A bound on how many configurations of so many elements are listed one after another from the empty one. */
export function mostConfigurations(carrier: Carrier, length: number): number {
  let most = 1;
  for (let named = 0; named < length && most < Infinity; named += 1)
    most *= carrier.mostExtensions(named, length - 1 - named);
  return most;
}

/** How many kinds of tuples there are; infinite when they cannot be listed within {@link MOST_LISTED}. */
export function countKinds(carrier: Carrier, length: number): number {
  // The kinds of points are numbered without listing them.
  if (!isOfPoints(carrier) && mostConfigurations(carrier, length) > MOST_LISTED) return Infinity;
  return carrier.kindCount(length);
}

function isOfPoints(carrier: Carrier): boolean {
  return carrier.description.kind === "points";
}
