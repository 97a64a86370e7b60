/** Points worked on between two yields: a few milliseconds, so that a server can answer others in between. */
export const POINTS_PER_TURN = 16_384;
