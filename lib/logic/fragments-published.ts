/** The decidable fragments that are recognised, with what is published about them. */
import type { FragmentName, Membership } from "./fragments.ts";

type Published = Omit<Membership, "points">;

/** Börger, Grädel & Gurevich, The Classical Decision Problem (1997), which lists the maximal classes, from memory. */
const BGG = "Börger, Grädel & Gurevich 1997";

/**
 * Of each fragment what does not depend on the sentence. Sources were looked up unless they say "from memory".
 * Where the bound is only asymptotic, no number is ever given.
 */
export const PUBLISHED: Readonly<Record<FragmentName, Published>> = {
  "bernays-schoenfinkel-ramsey": {
    fragment: "bernays-schoenfinkel-ramsey",
    name: "Bernays–Schönfinkel–Ramsey class",
    form: "∃*∀*, identity allowed",
    decidable: "yes",
    finiteModelProperty: true,
    bound: "at most max(1, k) points for k existential quantifiers; NEXPTIME-complete",
    maximalClass: "∃*∀* with identity (Ramsey)",
    source: `Bernays & Schönfinkel 1928; Ramsey 1930; Lewis 1980; ${BGG} (from memory)`,
  },
  ackermann: {
    fragment: "ackermann",
    name: "Ackermann class",
    form: "∃*∀∃*, without functions, identity allowed",
    decidable: "yes",
    finiteModelProperty: true,
    bound:
      "exponential in the number of relations and variables for a fixed vocabulary; EXPTIME-complete without identity",
    maximalClass: "∃*∀∃* with functions, without identity (Gurevich)",
    source: `Ackermann 1928; Gurevich 1973; ${BGG} (from memory)`,
  },
  "goedel-kalmar-schuette": {
    fragment: "goedel-kalmar-schuette",
    name: "Gödel–Kalmár–Schütte class",
    form: "∃*∀²∃*, without identity",
    decidable: "yes",
    finiteModelProperty: true,
    bound: null,
    maximalClass: "∃*∀²∃* without identity (Gödel, Kalmár, Schütte)",
    source: `Gödel 1932; Kalmár 1933; Schütte 1934; ${BGG} (from memory)`,
  },
  "two-variable": {
    fragment: "two-variable",
    name: "two-variable fragment",
    form: "two variables, which may be used again; identity allowed",
    decidable: "yes",
    finiteModelProperty: true,
    bound: "exponential in the length of the sentence; NEXPTIME-complete",
    maximalClass: null,
    source: "Scott 1962 (without identity); Mortimer 1975; Grädel, Kolaitis & Vardi 1997",
  },
  "two-variable-counting": {
    fragment: "two-variable-counting",
    name: "two-variable fragment with counting",
    form: "two variables and counting quantifiers, here “at most one” written with identity",
    decidable: "yes",
    finiteModelProperty: false,
    bound: "satisfiability and finite satisfiability NEXPTIME-complete",
    maximalClass: null,
    source: "Grädel, Otto & Rosen 1997; Pacholski, Szwast & Tendera 1997; Pratt-Hartmann 2005",
  },
  "two-variable-one-transitive": {
    fragment: "two-variable-one-transitive",
    name: "two-variable fragment with one transitive relation",
    form: "two variables, and one relation said to be transitive",
    decidable: "finite-only",
    finiteModelProperty: false,
    bound: null,
    maximalClass: null,
    source: "Szwast & Tendera 2013, and 2018 on the withdrawn claim for all structures",
  },
  monadic: {
    fragment: "monadic",
    name: "monadic class",
    form: "each atom about one point, identity allowed",
    decidable: "yes",
    finiteModelProperty: true,
    bound: "at most 2^k points for k relations; with identity 2^k times the number of variables",
    maximalClass: "monadic with unary functions, without identity (Löb, Gurevich)",
    source: "Löwenheim 1915; Behmann 1922; Pietruszczak 1996",
  },
  maslov: {
    fragment: "maslov",
    name: "Maslov class",
    form: "∃*∀*∃* with a Krom matrix, without identity",
    decidable: "yes",
    finiteModelProperty: true,
    bound: null,
    maximalClass: null,
    source: "Maslov 1964; Aanderaa & Goldfarb 1974 (authors from memory)",
  },
  "aea-krom": {
    fragment: "aea-krom",
    name: "∀∃∀ Krom class",
    form: "∀∃∀ with a Krom matrix, without identity",
    decidable: "yes",
    finiteModelProperty: false,
    bound: "there are sentences that have only infinite models",
    maximalClass: null,
    source: "Aanderaa & Lewis 1973",
  },
};

/** The maximal classes of sentences with identity, where they differ; both allow one unary function besides. */
export const MAXIMAL_WITH_IDENTITY: Partial<Readonly<Record<FragmentName, string>>> = {
  ackermann: "∃*∀∃* with one unary function and identity (Shelah)",
  monadic: "monadic with one unary function and identity (Rabin)",
};
