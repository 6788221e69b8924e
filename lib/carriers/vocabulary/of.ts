/** The vocabulary of any carrier. */
import { BooleanAlgebra } from "../boolean-algebra.ts";
import type { Carrier } from "../carrier.ts";
import { DenseLine } from "../dense-line.ts";
import { DenseTree } from "../dense-tree.ts";
import { Forest } from "../forest.ts";
import { Generic } from "../generic.ts";
import { HalfLine } from "../half-line.ts";
import { IntegerLine } from "../integer-line.ts";
import { Points } from "../points.ts";
import { Product } from "../product.ts";
import { Sum } from "../sum.ts";
import { Tuples } from "../tuples.ts";
import { productVocabulary, sumVocabulary, tuplesVocabulary } from "./composites.ts";
import { booleanAlgebraVocabulary, genericVocabulary } from "./generic.ts";
import { denseLineVocabulary, halfLineVocabulary, integerLineVocabulary } from "./lines.ts";
import { pointsVocabulary } from "./points.ts";
import { denseTreeVocabulary, forestVocabulary } from "./trees.ts";
import type { Vocabulary } from "./vocabulary.ts";

/** The vocabulary of a carrier, to be used with its configurations only. */
export function vocabularyOf(carrier: Carrier): Vocabulary<unknown> {
  if (carrier instanceof Points) return pointsVocabulary(carrier);
  if (carrier instanceof DenseLine) return denseLineVocabulary(carrier);
  if (carrier instanceof IntegerLine) return integerLineVocabulary(carrier);
  if (carrier instanceof HalfLine) return halfLineVocabulary(carrier);
  if (carrier instanceof Tuples) return tuplesVocabulary(carrier, vocabularyOf);
  if (carrier instanceof Sum) return sumVocabulary(carrier, vocabularyOf);
  if (carrier instanceof Product) return productVocabulary(carrier, vocabularyOf);
  if (carrier instanceof Generic) return genericVocabulary(carrier);
  if (carrier instanceof BooleanAlgebra) return booleanAlgebraVocabulary(carrier);
  if (carrier instanceof DenseTree) return denseTreeVocabulary(carrier);
  if (carrier instanceof Forest) return forestVocabulary(carrier);
  throw new Error(`no vocabulary for ${carrier.description.kind}`);
}
