/** Slope of the hidden units below zero where nothing else is asked for. */
export const leak = 0.3;
