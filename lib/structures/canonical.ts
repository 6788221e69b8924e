import type { Meter } from "../logic/meter.ts";

/** Automorphisms that are remembered for pruning. */
const MOST_AUTOMORPHISMS = 64;

/** Mixes a number into 32 bits that look random; the same on every machine. */
function mix(value: number): number {
  let mixed = Math.imul(value ^ (value >>> 16), 0x7feb352d);
  mixed = Math.imul(mixed ^ (mixed >>> 15), 0x846ca68b);
  return mixed ^ (mixed >>> 16);
}

/** The tuples of a relation of three or more places, or what else is looked at tuple by tuple. */
interface Tuples {
  readonly places: number;
  /** The points of all tuples, one tuple after another. */
  readonly points: Int32Array;
  /** For each tuple, a hash of the relation and of which of its points are equal. */
  readonly patterns: Int32Array;
}

/**
 * Finds the canonical form of finite structures of one shape: relations of given numbers of places on so many points.
 * Two structures of the shape have the same form exactly if they are isomorphic.
 *
 * Points are sorted into cells by what can be told of them from their cells and the relations (refinement); where
 * that does not tell all points apart, each point of a cell is singled out in turn and the refinement goes on
 * (individualisation). The leaves of this tree are orders of the points; the form is the least table among those
 * of the leaves with the least traces. Leaves with equal tables give automorphisms, by which other branches are
 * left out (McKay 1981; McKay & Piperno 2014). Hashes decide how cells are split and ordered, and depend on
 * nothing but the structure up to isomorphism, so that a collision costs time and never correctness.
 */
export class Canoniser {
  readonly #size: number;
  readonly #places: readonly number[];
  /** Indexes of relations of two places. */
  readonly #pairs: readonly number[];
  readonly #hasTuples: boolean;

  // The structure at hand

  #tables: readonly Uint8Array[] = [];
  #tuples: readonly Tuples[] = [];
  /** By pair of points (i·size + j): a hash of which two-place relations hold of (i, j) and of (j, i); 0 for none. */
  readonly #pairHash: Int32Array;
  /** Work for {@link #readPairs}: by whether a relation holds of (i, j), plus 2 if of (j, i), the hash of that. */
  readonly #pairMarks = new Int32Array(4);
  #meter: Meter | null = null;

  // The partition into cells. Each depth of the tree has its own stretch of `size` entries in both arrays

  /** The points, cell by cell. */
  readonly #order: Int32Array;
  /** By point: the index in the order at which its cell begins. */
  readonly #cell: Int32Array;
  /** By point: the hash of the current round of refinement. */
  readonly #hash: Int32Array;
  /** By point: the hash of its cell in the current round. */
  readonly #cellHash: Int32Array;
  /** By index in the order: the hash of a cell that begins there. */
  readonly #placeHash: Int32Array;

  // The search

  /** By depth: the point that is singled out there on the current path. */
  readonly #path: Int32Array;
  /** By depth: the trace of the refinement on the current path, and on the path to the best leaf. */
  readonly #traces: Int32Array;
  readonly #bestTraces: Int32Array;
  readonly #bestPath: Int32Array;
  #bestDepth = -1;
  /** The order of the points at the best leaf. */
  readonly #bestOrder: Int32Array;
  /** The tables at the current and at the best leaf, in printed form: one byte for six entries. */
  #table: Uint8Array;
  #best: Uint8Array;
  /** Each an array from points to points. */
  #automorphisms: Int32Array[] = [];
  /** Work for {@link #orbitOf}: by point, its parent in a forest of orbits. */
  readonly #forest: Int32Array;
  /** How often a best leaf has been put in place of another, in this call. */
  #bestCount = 0;
  /**
   * For each depth on the path to the best leaf, how many points the automorphisms that leave the path above alone
   * take its point to.
   */
  readonly #orbitSizes: Int32Array;
  /** Work for {@link #search}: for each depth, 1 for the members of the cell that are counted there. */
  readonly #inOrbit: Uint8Array;

  /**
   * @param size how many points
   * @param places of each relation how many places it has
   */
  constructor(size: number, places: readonly number[]) {
    this.#size = size;
    this.#places = places;
    this.#pairs = [...places.keys()].filter((index) => places[index] === 2);
    this.#hasTuples = places.some((count) => count > 2);
    this.#pairHash = new Int32Array(this.#pairs.length > 0 ? size * size : 0);
    this.#order = new Int32Array(size * (size + 1));
    this.#cell = new Int32Array(size * (size + 1));
    this.#hash = new Int32Array(size);
    this.#cellHash = new Int32Array(size);
    this.#placeHash = Int32Array.from({ length: size }, (_, place) => mix(place + 1));
    this.#inOrbit = new Uint8Array(size * (size + 1));
    this.#path = new Int32Array(size + 1);
    this.#traces = new Int32Array(size + 1);
    this.#bestTraces = new Int32Array(size + 1);
    this.#bestPath = new Int32Array(size + 1);
    this.#bestOrder = new Int32Array(size);
    this.#forest = new Int32Array(size);
    this.#orbitSizes = new Int32Array(size + 1);
    const entries = places.reduce((sum, count) => sum + size ** count, 0);
    this.#table = new Uint8Array(Math.ceil(entries / 6));
    this.#best = new Uint8Array(this.#table.length);
  }

  /**
   * The canonical form of a structure: its tables, one after another, with the points in canonical order, six
   * entries to a character.
   * @param tables for each relation its table as in `Structure`, 1 where it holds: (i, j) is at i·size + j
   * @param meter pays for pairs and tuples looked at; throws `WorkEnded` when it ends
   */
  canonise(tables: readonly Uint8Array[], meter: Meter | null = null): string {
    return printed(this.canoniseToBytes(tables, meter));
  }

  /** As {@link canonise}, but returns the characters as ASCII bytes, in an array that the next call may change. */
  canoniseToBytes(tables: readonly Uint8Array[], meter: Meter | null = null): Uint8Array {
    this.#tables = tables;
    this.#meter = meter;
    this.#bestDepth = -1;
    this.#bestCount = 0;
    if (this.#automorphisms.length > 0) this.#automorphisms = [];
    this.#readPairs();
    if (this.#hasTuples) this.#tuples = tables.flatMap((_, index) => this.#readTuples(index));
    this.#startCells();
    this.#traces[0] = this.#refine(0);
    this.#search(0);
    return this.#best;
  }

  /**
   * The order of points that the last call of {@link canonise} found: the point that comes first, and so on. The
   * next call may change it.
   */
  get order(): Int32Array {
    return this.#bestOrder;
  }

  /**
   * How many automorphisms the structure of the last call of {@link canonise} has: the product of the sizes of orbits
   * along the path to the best leaf, each under the automorphisms that leave the points before it alone
   * (orbit-stabiliser theorem).
   */
  get automorphismCount(): bigint {
    let count = 1n;
    for (let depth = 0; depth < this.#bestDepth; depth += 1) count *= BigInt(this.#orbitSizes[depth]!);
    return count;
  }

  // Reading the structure

  /** Fills {@link #pairHash}, and {@link #hash} with what it says of each point alone. */
  #readPairs(): void {
    const size = this.#size;
    const pairHash = this.#pairHash;
    const hash = this.#hash;
    const found = this.#pairMarks;
    hash.fill(0);
    for (let nth = 0; nth < this.#pairs.length; nth += 1) {
      const table = this.#tables[this.#pairs[nth]!]!;
      const there = mix(nth * 2 + 1);
      const back = mix(nth * 2 + 2);
      // Entries are random as far as a processor can tell: looking hashes up is cheaper than branches.
      found[1] = there;
      found[2] = back;
      found[3] = there + back;
      for (let i = 0; i < size; i += 1) {
        const row = i * size;
        let sum = found[table[row + i]! * 3]!;
        pairHash[row + i] = (nth === 0 ? 0 : pairHash[row + i]!) + sum;
        sum = mix(sum);
        for (let j = 0, at = i; j < i; j += 1, at += size) {
          const entry = table[row + j]! + table[at]! * 2;
          const own = found[entry]!;
          const other = found[((entry & 1) << 1) | (entry >> 1)]!;
          pairHash[row + j] = (nth === 0 ? 0 : pairHash[row + j]!) + own;
          pairHash[at] = (nth === 0 ? 0 : pairHash[at]!) + other;
          sum = (sum + Math.imul(own, own | 1)) | 0;
          hash[j] = (hash[j]! + Math.imul(other, other | 1)) | 0;
        }
        hash[i] = (hash[i]! + sum) | 0;
      }
    }
  }

  #readTuples(index: number): Tuples[] {
    const places = this.#places[index]!;
    if (places <= 2) return [];
    const table = this.#tables[index]!;
    const points: number[] = [];
    const patterns: number[] = [];
    for (let kind = 0; kind < table.length; kind += 1) {
      if (table[kind] !== 1) continue;
      const from = points.length;
      for (let place = 0, rest = kind; place < places; place += 1, rest = Math.floor(rest / this.#size))
        points.push(rest % this.#size);
      let pattern = mix(index + 1);
      for (let at = from; at < points.length; at += 1)
        pattern = mix(pattern + points.indexOf(points[at]!, from) - from);
      patterns.push(pattern);
    }
    return [{ places, points: Int32Array.from(points), patterns: Int32Array.from(patterns) }];
  }

  /** Puts points in cells by what holds of each alone, and by how many pairs of each sort it is in. */
  #startCells(): void {
    const size = this.#size;
    const hash = this.#hash;
    for (let index = 0; index < this.#places.length; index += 1) {
      const places = this.#places[index]!;
      if (places === 2) continue;
      const table = this.#tables[index]!;
      let step = 0;
      for (let place = 0; place < places; place += 1) step = step * size + 1;
      for (let point = 0; point < size; point += 1)
        if (table[point * step] === 1) hash[point] = (hash[point]! + mix(index + 1)) | 0;
    }
    for (let point = 0; point < size; point += 1) {
      this.#order[point] = point;
      this.#cell[point] = 0;
    }
    this.#splitCell(0, 0, size);
  }

  // Refinement

  /**
   * Splits cells until no point of a cell can be told from another of it by the cells of the points with which it is
   * in a relation. Returns a trace, which isomorphic partitions share.
   */
  #refine(depth: number): number {
    const size = this.#size;
    const base = depth * size;
    const order = this.#order;
    const cell = this.#cell;
    let trace = 0;
    for (;;) {
      this.#beginRound(base);
      let split = false;
      let discrete = true;
      for (let from = 0; from < size; ) {
        let to = from + 1;
        while (to < size && cell[base + order[base + to]!] === from) to += 1;
        if (to > from + 1) {
          this.#hashByPairs(base + from, base + to);
          if (this.#splitCell(base, from, to)) split = true;
          for (let at = from; at < to; at += 1) {
            const point = order[base + at]!;
            trace = mix(trace + this.#hash[point]!) + cell[base + point]!;
            if (at > from && cell[base + point] !== at) discrete = false;
          }
        }
        from = to;
      }
      if (!split || discrete) return trace | 0;
    }
  }

  /** Takes the cells as they are as the ground for a round of hashes, and hashes points by tuples. */
  #beginRound(base: number): void {
    const size = this.#size;
    const cell = this.#cell;
    const hash = this.#hash;
    const cellHash = this.#cellHash;
    const placeHash = this.#placeHash;
    let work = size * size;
    for (let point = 0; point < size; point += 1) cellHash[point] = placeHash[cell[base + point]!]!;
    if (this.#hasTuples || this.#pairHash.length === 0) hash.fill(0);
    if (this.#hasTuples)
      for (const { places, points, patterns } of this.#tuples) {
        work += points.length;
        for (let tuple = 0; tuple < patterns.length; tuple += 1) {
          const from = tuple * places;
          let all = patterns[tuple]!;
          for (let at = from; at < from + places; at += 1) all = mix(all + cellHash[points[at]!]!);
          for (let place = 0; place < places; place += 1) {
            const point = points[from + place]!;
            hash[point] = (hash[point]! + mix(all + place)) | 0;
          }
        }
      }
    this.#meter?.charge(work);
  }

  /** Hashes the points of a stretch of the order by the cells of those with which they are in a two-place relation. */
  #hashByPairs(from: number, to: number): void {
    const size = this.#size;
    const order = this.#order;
    const hash = this.#hash;
    const cellHash = this.#cellHash;
    const pairHash = this.#pairHash;
    if (pairHash.length === 0) return;
    const byTuples = this.#hasTuples;
    for (let at = from; at < to; at += 1) {
      const point = order[at]!;
      const row = point * size;
      let sum = byTuples ? hash[point]! : 0;
      for (let other = 0; other < size; other += 1) {
        const mixed = Math.imul(cellHash[other]! + pairHash[row + other]!, 0x9e3779b1 | 0);
        sum = (sum + (mixed ^ (mixed >>> 15))) | 0;
      }
      hash[point] = sum;
    }
  }

  /** Sorts a cell by hash and splits it where hashes differ; whether they do. */
  #splitCell(base: number, from: number, to: number): boolean {
    const order = this.#order;
    const hash = this.#hash;
    for (let at = from + 1; at < to; at += 1) {
      const point = order[base + at]!;
      const own = hash[point]!;
      let place = at;
      for (; place > from && hash[order[base + place - 1]!]! > own; place -= 1)
        order[base + place] = order[base + place - 1]!;
      order[base + place] = point;
    }
    const cell = this.#cell;
    let start = from;
    for (let at = from + 1; at < to; at += 1) {
      const point = order[base + at]!;
      if (hash[point] !== hash[order[base + at - 1]!]) start = at;
      cell[base + point] = start;
    }
    return start > from;
  }

  // The tree

  /**
   * Explores the tree below the partition at `depth`.
   * @returns the depth at which the search goes on: less than `depth` when this branch is like one seen before
   */
  #search(depth: number): number {
    if (this.#bestDepth >= 0) {
      // The path up to here has the traces of the best one, so far.
      const limit = Math.min(depth, this.#bestDepth);
      if (depth > this.#bestDepth) return depth;
      const own = this.#traces[limit]!;
      const best = this.#bestTraces[limit]!;
      if (own > best) return depth;
      if (own < best) this.#bestDepth = -1;
    }
    const size = this.#size;
    const base = depth * size;
    const order = this.#order;
    const cell = this.#cell;
    let from = -1;
    let length = size + 1;
    for (let at = 0; at < size; ) {
      let to = at + 1;
      while (to < size && cell[base + order[base + to]!] === at) to += 1;
      if (to - at > 1 && to - at < length) {
        from = at;
        length = to - at;
      }
      at = to;
    }
    if (from < 0) return this.#leaf(depth);

    const members = base + from;
    const alike = this.#areTwins(members, length);
    // The best leaf is the first that was met of those with its table, so that members before its own are not in the
    // orbit of that one; a later one that is has an automorphism by which it was left out, or leads to one.
    const inOrbit = this.#inOrbit;
    inOrbit.fill(0, base, base + length);
    let orbit = 0;
    for (let nth = 0; nth < length; nth += 1) {
      const point = order[members + nth]!;
      if (nth > 0) {
        const older = alike ? 0 : this.#olderInOrbit(depth, members, nth);
        if (older >= 0) {
          orbit += inOrbit[base + older]!;
          inOrbit[base + nth] = inOrbit[base + older]!;
          continue;
        }
      }
      const next = base + size;
      order.copyWithin(next, base, base + size);
      cell.copyWithin(next, base, base + size);
      for (let at = from + 1, source = from; at < from + length; source += 1) {
        const other = order[base + source]!;
        if (other === point) continue;
        order[next + at] = other;
        cell[next + other] = from + 1;
        at += 1;
      }
      order[next + from] = point;
      this.#path[depth] = point;
      this.#traces[depth + 1] = this.#refine(depth + 1);
      const bestBefore = this.#bestCount;
      const back = this.#search(depth + 1);
      if (back < depth) return back;
      if (this.#bestCount > bestBefore) {
        inOrbit.fill(0, base, base + length);
        inOrbit[base + nth] = 1;
        orbit = 1;
      } else if (back === depth) {
        inOrbit[base + nth] = 1;
        orbit += 1;
      }
    }
    // Zero when the best leaf is elsewhere.
    if (orbit > 0) this.#orbitSizes[depth] = orbit;
    return depth;
  }

  /** Compares the table of a leaf with the best one. */
  #leaf(depth: number): number {
    const base = depth * this.#size;
    this.#writeTable(base);
    let difference = 0;
    if (this.#bestDepth < 0) difference = -1;
    else {
      // A leaf above the best one has no trace beyond its own depth, and comes first.
      if (depth < this.#bestDepth) difference = -1;
      const table = this.#table;
      const best = this.#best;
      for (let at = 0; difference === 0 && at < table.length; at += 1) difference = table[at]! - best[at]!;
    }
    if (difference > 0) return depth;
    if (difference === 0) return this.#noteAutomorphism(depth, base);
    const table = this.#best;
    this.#best = this.#table;
    this.#table = table;
    this.#bestDepth = depth;
    this.#bestCount += 1;
    for (let at = 0; at <= depth; at += 1) {
      this.#bestTraces[at] = this.#traces[at]!;
      this.#bestPath[at] = this.#path[at]!;
    }
    for (let at = 0; at < this.#size; at += 1) this.#bestOrder[at] = this.#order[base + at]!;
    return depth;
  }

  /** Keeps the automorphism between the best leaf and this one; returns the depth at which their paths part. */
  #noteAutomorphism(depth: number, base: number): number {
    if (this.#automorphisms.length < MOST_AUTOMORPHISMS) {
      const automorphism = new Int32Array(this.#size);
      for (let at = 0; at < this.#size; at += 1) automorphism[this.#bestOrder[at]!] = this.#order[base + at]!;
      this.#automorphisms.push(automorphism);
    }
    for (let at = 0; at < depth; at += 1) if (this.#path[at] !== this.#bestPath[at]) return at;
    return depth;
  }

  /**
   * Of the cell whose members begin there in the order, the number of an earlier one that automorphisms which leave
   * the path alone take to the nth; −1 for none.
   */
  #olderInOrbit(depth: number, members: number, nth: number): number {
    if (this.#automorphisms.length === 0) return -1;
    const forest = this.#forest;
    for (let point = 0; point < this.#size; point += 1) forest[point] = point;
    for (const automorphism of this.#automorphisms) {
      let fixes = true;
      for (let at = 0; fixes && at < depth; at += 1) fixes = automorphism[this.#path[at]!] === this.#path[at];
      if (!fixes) continue;
      for (let point = 0; point < this.#size; point += 1) {
        const a = this.#orbitOf(point);
        const b = this.#orbitOf(automorphism[point]!);
        if (a !== b) forest[b] = a;
      }
    }
    const orbit = this.#orbitOf(this.#order[members + nth]!);
    for (let older = 0; older < nth; older += 1)
      if (this.#orbitOf(this.#order[members + older]!) === orbit) return older;
    return -1;
  }

  #orbitOf(point: number): number {
    const forest = this.#forest;
    let root = point;
    while (forest[root] !== root) {
      forest[root] = forest[forest[root]!]!;
      root = forest[root]!;
    }
    return root;
  }

  /**
   * Whether exchanging any two points of a cell, which stands there in the order, is an automorphism; not looked at
   * beyond two places.
   */
  #areTwins(from: number, length: number): boolean {
    if (this.#hasTuples) return false;
    const size = this.#size;
    const order = this.#order;
    const first = order[from]!;
    for (let index = 0; index < this.#places.length; index += 1) {
      const table = this.#tables[index]!;
      for (let nth = 1; nth < length; nth += 1) {
        const other = order[from + nth]!;
        if (this.#places[index] === 1) {
          if (table[first] !== table[other]) return false;
          continue;
        }
        if (table[first * size + other] !== table[other * size + first]) return false;
        if (table[first * size + first] !== table[other * size + other]) return false;
        for (let point = 0; point < size; point += 1) {
          if (point === first || point === other) continue;
          if (table[first * size + point] !== table[other * size + point]) return false;
          if (table[point * size + first] !== table[point * size + other]) return false;
        }
      }
    }
    return true;
  }

  /** Writes the tables with the points in the order of a leaf to {@link #table}. */
  #writeTable(base: number): void {
    const size = this.#size;
    const order = this.#order;
    const out = this.#table;
    let bits = 0;
    let count = 0;
    let at = 0;
    for (let index = 0; index < this.#places.length; index += 1) {
      const table = this.#tables[index]!;
      const places = this.#places[index]!;
      const rows = size ** (places - 1);
      for (let row = 0; row < rows; row += 1) {
        let kind = 0;
        if (places === 2) kind = order[base + row]! * size;
        else
          for (let rest = row, weight = size, place = 1; place < places; place += 1) {
            kind += order[base + (rest % size)]! * weight;
            rest = Math.floor(rest / size);
            weight *= size;
          }
        for (let last = 0; last < size; last += 1) {
          bits = (bits << 1) | table[kind + order[base + last]!]!;
          count += 1;
          if (count === 6) {
            out[at++] = FIRST_CHARACTER + bits;
            bits = 0;
            count = 0;
          }
        }
      }
    }
    if (count > 0) out[at] = FIRST_CHARACTER + (bits << (6 - count));
  }
}

/** The character for six entries that are 0; the others follow it in ASCII. */
const FIRST_CHARACTER = 48;

function printed(bytes: Uint8Array): string {
  let text = "";
  for (let from = 0; from < bytes.length; from += 4096)
    text += String.fromCharCode(...bytes.subarray(from, from + 4096));
  return text;
}
