/** Steps kept to be undone; far more than anybody walks back, and bounded. */
export const LONGEST_HISTORY = 500;

/** Grid of a dragged or nudged point [m]: whole millimetres are how these parts are drawn. */
export const GRID = 1e-3;
/** Step of an arrow key with Shift and with Alt [m]. */
export const LONG_STEP = 10e-3;
export const FINE_STEP = 0.1e-3;

/** Rise of a side that has just been bent, as a share of its chord: enough to see and to take hold of. */
export const FIRST_RISE = 0.1;
