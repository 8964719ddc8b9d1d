// Raw linear memory: typed access by element number, and an arena that only grows until it is reset to a mark.
// All kernels work on offsets into it; nothing here is garbage collected.

@inline export function getInt(list: usize, i: i32): i32 {
  return load<i32>(list + (<usize>i << 2));
}
@inline export function setInt(list: usize, i: i32, value: i32): void {
  store<i32>(list + (<usize>i << 2), value);
}
@inline export function getReal(list: usize, i: i32): f64 {
  return load<f64>(list + (<usize>i << 3));
}
@inline export function setReal(list: usize, i: i32, value: f64): void {
  store<f64>(list + (<usize>i << 3), value);
}
/** offset of the i-th 64-bit value */
@inline export function realAt(list: usize, i: i32): usize {
  return list + (<usize>i << 3);
}
@inline export function intAt(list: usize, i: i32): usize {
  return list + (<usize>i << 2);
}

const PAGE: usize = 65536;
/** Spare bytes behind each array, so that vector loads may run past its end. */
const SLACK: usize = 64;

let top: usize = PAGE;

/** Room for `bytes`, aligned to a cache line; grows the memory when needed. Traps when the machine has no more. */
export function allocate(bytes: usize): usize {
  const start = (top + 63) & ~63;
  top = start + bytes + SLACK;
  const pages = <i32>((top + PAGE - 1) / PAGE);
  const missing = pages - memory.size();
  // Growing is costly, untouched pages are not: take an eighth more than asked, if there is that much.
  if (missing > 0 && memory.grow(missing + (pages >> 3)) < 0 && memory.grow(missing) < 0) unreachable();
  return start;
}
export function allocateInts(count: i32): usize {
  return allocate(<usize>count << 2);
}
export function allocateReals(count: i32): usize {
  return allocate(<usize>count << 3);
}
/** where the next array would be put; `reset` gives back all that was allocated since */
export function mark(): usize {
  return top;
}
export function reset(to: usize): void {
  top = to < PAGE ? PAGE : to;
}
/** fill with 0 (byte 0) or -1 (byte 255) */
@inline export function fillInts(list: usize, count: i32, byte: u8): void {
  memory.fill(list, byte, <usize>count << 2);
}
