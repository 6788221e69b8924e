/** From descriptions to carriers. */
import type { CarrierDescription } from "../logic/structure-definition.ts";
import { BooleanAlgebra } from "./boolean-algebra.ts";
import type { Carrier } from "./carrier.ts";
import { DenseLine } from "./dense-line.ts";
import { DenseTree } from "./dense-tree.ts";
import { Forest } from "./forest.ts";
import { Generic } from "./generic.ts";
import { HalfLine } from "./half-line.ts";
import { IntegerLine } from "./integer-line.ts";
import { Points } from "./points.ts";
import { Product } from "./product.ts";
import { Sum } from "./sum.ts";
import { Tuples } from "./tuples.ts";

/** Builds the carrier that a description names. */
// biome-ignore lint/suspicious/noExplicitAny: configurations are opaque outside of their carrier
export function buildCarrier(description: CarrierDescription): Carrier<any> {
  switch (description.kind) {
    case "points":
      return new Points(description.size);
    case "dense-line":
      return new DenseLine(description);
    case "integer-line":
      return new IntegerLine(description);
    case "half-line":
      return new HalfLine(description);
    case "tuples":
      return new Tuples(description, buildCarrier(description.over));
    case "sum":
      return new Sum(description, description.parts.map(buildCarrier));
    case "product":
      return new Product(description, buildCarrier(description.outer), buildCarrier(description.inner));
    case "generic":
      return new Generic(description);
    case "boolean-algebra":
      return new BooleanAlgebra(description);
    case "dense-tree":
      return new DenseTree();
    case "forest":
      return new Forest(description);
  }
}
