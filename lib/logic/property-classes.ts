/** The named classes of relations that are conjunctions of other named properties. */
interface PropertyClass {
  readonly name: string;
  readonly synonyms: readonly string[];
  readonly meaning: string;
  readonly source: string;
  readonly parts: readonly string[];
}

const ORDERS = "Fishburn 1985";
const LATTICES = "Davey and Priestley 2002";
const RELATIONS = "Schmidt and Ströhlein 1993";
const GRAPHS = "Diestel 2017";
const PARTHOOD = "Casati and Varzi 1999";

function conjunction(names: string, meaning: string, source: string, parts: string): PropertyClass {
  const [name, ...synonyms] = names.split(" ");
  return { name: name!, synonyms, meaning, source, parts: parts.split(" ") };
}

/** A class may be a part of those after it. */
export const propertyClasses: readonly PropertyClass[] = [
  // Orders
  conjunction("preorder quasi-order", "Reflexive and transitive.", LATTICES, "reflexive transitive"),
  conjunction("total-preorder", "Connex and transitive.", ORDERS, "connex transitive"),
  conjunction(
    "partial-order ground-mereology",
    "Reflexive, antisymmetric and transitive.",
    LATTICES,
    "reflexive antisymmetric transitive",
  ),
  conjunction(
    "strict-order strict-partial-order",
    "Irreflexive and transitive.",
    ORDERS,
    "irreflexive transitive",
  ),
  conjunction(
    "linear-order total-order",
    "Antisymmetric, transitive and connex.",
    LATTICES,
    "antisymmetric transitive connex",
  ),
  conjunction(
    "strict-linear-order strict-total-order",
    "Irreflexive, transitive and semi-connex.",
    "Rosenstein 1982",
    "irreflexive transitive semi-connex",
  ),
  conjunction(
    "strict-weak-order",
    "Asymmetric and negatively transitive.",
    ORDERS,
    "asymmetric negatively-transitive",
  ),
  conjunction("interval-order", "Irreflexive and Ferrers.", "Fishburn 1970", "irreflexive ferrers"),
  conjunction(
    "semiorder",
    "Irreflexive, Ferrers and semitransitive.",
    "Luce 1956; Scott and Suppes 1958",
    "irreflexive ferrers semitransitive",
  ),
  conjunction(
    "semitransitive-order",
    "A strict order that is semitransitive.",
    ORDERS,
    "irreflexive transitive semitransitive",
  ),
  conjunction(
    "series-parallel-order",
    "A strict order without a suborder N.",
    "Valdes, Tarjan and Lawler 1982",
    "irreflexive transitive n-free",
  ),
  conjunction(
    "dense-linear-order-without-endpoints",
    "A strict linear order, dense, without a first and a last element.",
    "Cantor 1895",
    "strict-linear-order dense right-serial left-serial",
  ),
  conjunction(
    "discrete-linear-order-without-endpoints",
    "A strict linear order in which every element has an immediate successor and predecessor.",
    "Rosenstein 1982",
    "strict-linear-order immediate-successors immediate-predecessors",
  ),
  conjunction(
    "meet-semilattice",
    "A partial order with binary meets.",
    LATTICES,
    "partial-order binary-meets",
  ),
  conjunction(
    "join-semilattice",
    "A partial order with binary joins.",
    LATTICES,
    "partial-order binary-joins",
  ),
  conjunction(
    "lattice",
    "A partial order with binary meets and joins.",
    LATTICES,
    "partial-order binary-meets binary-joins",
  ),
  conjunction(
    "bounded-order",
    "A partial order with a least and a greatest element.",
    LATTICES,
    "partial-order least-element greatest-element",
  ),
  // Equivalences and the like
  conjunction(
    "equivalence",
    "Reflexive, symmetric and transitive.",
    RELATIONS,
    "reflexive symmetric transitive",
  ),
  conjunction("partial-equivalence", "Symmetric and transitive.", "Scott 1976", "symmetric transitive"),
  conjunction("tolerance dependency", "Reflexive and symmetric.", "Zeeman 1962", "reflexive symmetric"),
  // Functions
  conjunction("function mapping", "Right-serial and right-unique.", RELATIONS, "right-serial right-unique"),
  conjunction("injection", "A function that is left-unique.", RELATIONS, "function left-unique"),
  conjunction("surjection", "A function that is left-serial.", RELATIONS, "function left-serial"),
  conjunction(
    "permutation bijection",
    "A function that is left-unique and left-serial.",
    RELATIONS,
    "function left-unique left-serial",
  ),
  conjunction(
    "partial-permutation partial-injection",
    "Right-unique and left-unique.",
    "Howie 1995",
    "right-unique left-unique",
  ),
  conjunction(
    "derangement",
    "A permutation without a fixed point.",
    "Stanley 2011",
    "permutation irreflexive",
  ),
  conjunction("involution", "A function that is symmetric.", "Stanley 2011", "function symmetric"),
  conjunction("idempotent-function", "A function that is transitive.", "Howie 1995", "function transitive"),
  // Graphs
  conjunction("tournament", "Asymmetric and semi-connex.", "Moon 1968", "asymmetric semi-connex"),
  conjunction("simple-graph", "Irreflexive and symmetric.", GRAPHS, "irreflexive symmetric"),
  conjunction("triangle-free-graph", "Symmetric and antitransitive.", GRAPHS, "symmetric antitransitive"),
  conjunction(
    "threshold-graph",
    "A simple graph without alternating 4-cycles.",
    "Chvátal and Hammer 1977",
    "simple-graph no-alternating-4-cycle",
  ),
  conjunction(
    "perfect-matching",
    "A simple graph in which every point has one neighbour.",
    GRAPHS,
    "simple-graph function",
  ),
  conjunction(
    "friendship-graph",
    "A simple graph in which any two points have one common neighbour.",
    "Erdős, Rényi and Sós 1966",
    "simple-graph one-common-neighbour",
  ),
  // Parthood
  conjunction(
    "minimal-mereology",
    "A partial order with weak supplementation.",
    PARTHOOD,
    "partial-order weak-supplementation",
  ),
  conjunction(
    "extensional-mereology",
    "A partial order with strong supplementation.",
    PARTHOOD,
    "partial-order strong-supplementation",
  ),
  conjunction(
    "closed-extensional-mereology",
    "Extensional mereology with binary sums and products.",
    PARTHOOD,
    "extensional-mereology binary-sums binary-products",
  ),
];
