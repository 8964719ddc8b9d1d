// The elimination tree of a symmetric pattern, its postorder, and the number of entries in each column of the factor.
import { allocateInts, fillInts, getInt, mark, reset, setInt } from "./memory";

/**
 * Parent of each column in the elimination tree (Liu 1986, with path compression), -1 for roots.
 *
 * @param order    point of each place
 * @param placeOf  place of each point
 * @param out      n ints, by place
 */
export function eliminationTree(
  n: i32,
  rowStart: usize,
  columns: usize,
  order: usize,
  placeOf: usize,
  out: usize,
): void {
  const before = mark();
  const ancestor = allocateInts(n);
  fillInts(out, n, 255);
  fillInts(ancestor, n, 255);
  for (let i = 0; i < n; i++) {
    const v = getInt(order, i);
    for (let q = getInt(rowStart, v), end = getInt(rowStart, v + 1); q < end; q++) {
      let j = getInt(placeOf, getInt(columns, q));
      while (j >= 0 && j < i) {
        const next = getInt(ancestor, j);
        setInt(ancestor, j, i);
        if (next < 0) setInt(out, j, i);
        j = next;
      }
    }
  }
  reset(before);
}

/**
 * Renumber the places so that every subtree is contiguous and children precede parents. `order` and `parent` are
 * replaced by their renumbered selves.
 */
export function postorder(n: i32, order: usize, parent: usize): void {
  const before = mark();
  const firstChild = allocateInts(n);
  const sibling = allocateInts(n);
  const stack = allocateInts(n);
  const newPlace = allocateInts(n);
  const newOrder = allocateInts(n);
  const newParent = allocateInts(n);
  fillInts(firstChild, n, 255);
  for (let i = n - 1; i >= 0; i--) {
    const p = getInt(parent, i);
    if (p < 0) continue;
    setInt(sibling, i, getInt(firstChild, p));
    setInt(firstChild, p, i);
  }
  let next = 0;
  for (let root = 0; root < n; root++) {
    if (getInt(parent, root) >= 0) continue;
    let depth = 0;
    setInt(stack, 0, root);
    while (depth >= 0) {
      const i = getInt(stack, depth);
      const child = getInt(firstChild, i);
      if (child >= 0) {
        setInt(firstChild, i, getInt(sibling, child));
        setInt(stack, ++depth, child);
      } else {
        setInt(newPlace, i, next++);
        depth--;
      }
    }
  }
  for (let i = 0; i < n; i++) {
    const place = getInt(newPlace, i);
    const p = getInt(parent, i);
    setInt(newOrder, place, getInt(order, i));
    setInt(newParent, place, p < 0 ? -1 : getInt(newPlace, p));
  }
  memory.copy(order, newOrder, (<usize>n) << 2);
  memory.copy(parent, newParent, (<usize>n) << 2);
  reset(before);
}

/**
 * Entries in each column of the factor, diagonal included, in nearly linear time (Gilbert, Ng and Peyton 1994): a
 * column counts the leaves of the row subtrees in its subtree, less what their least common ancestors count twice.
 * Places must be in postorder; `columns` and `rowStart` are the pattern by place.
 */
export function columnCounts(n: i32, rowStart: usize, columns: usize, parent: usize, out: usize): void {
  const before = mark();
  const firstDescendant = allocateInts(n);
  const highestFirst = allocateInts(n);
  const previousLeaf = allocateInts(n);
  const ancestor = allocateInts(n);
  for (let j = 0; j < n; j++) {
    setInt(firstDescendant, j, -1);
    setInt(ancestor, j, j);
  }
  for (let j = 0; j < n; j++) {
    // The first to reach an unnumbered column is its first descendant; a column nobody reached yet is a leaf.
    setInt(out, j, getInt(firstDescendant, j) < 0 ? 1 : 0);
    for (let i = j; i >= 0 && getInt(firstDescendant, i) < 0; i = getInt(parent, i))
      setInt(firstDescendant, i, j);
  }
  fillInts(highestFirst, n, 255);
  fillInts(previousLeaf, n, 255);
  for (let j = 0; j < n; j++) {
    const p = getInt(parent, j);
    if (p >= 0) setInt(out, p, getInt(out, p) - 1);
    const first = getInt(firstDescendant, j);
    for (let q = getInt(rowStart, j + 1) - 1; ; q--) {
      const i = getInt(columns, q);
      if (i <= j) break;
      if (first <= getInt(highestFirst, i)) continue;
      setInt(highestFirst, i, first);
      setInt(out, j, getInt(out, j) + 1);
      const leaf = getInt(previousLeaf, i);
      setInt(previousLeaf, i, j);
      if (leaf < 0) continue;
      let common = leaf;
      while (getInt(ancestor, common) != common) common = getInt(ancestor, common);
      for (let k = leaf; k != common;) {
        const next = getInt(ancestor, k);
        setInt(ancestor, k, common);
        k = next;
      }
      setInt(out, common, getInt(out, common) - 1);
    }
    if (p >= 0) setInt(ancestor, j, p);
  }
  for (let j = 0; j < n; j++) {
    const p = getInt(parent, j);
    if (p >= 0) setInt(out, p, getInt(out, p) + getInt(out, j));
  }
  reset(before);
}
