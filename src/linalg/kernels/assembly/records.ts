// The record in which a point travels through the dissection, all 32-bit whole numbers: lowest r, z and highest r, z of
// the point and its neighbours; its own r, z; its number.
export const RECORD: usize = 32;
export const LOW: usize = 0;
export const HIGH: usize = 8;
export const OWN: usize = 16;
export const NUMBER: usize = 24;
