// How the meters fall and hold. Common practice, no source: fast enough to follow playing, slow enough to be read.
export const FALL_DB_PER_S = 24
export const HOLD_S = 1.5
/** How long "over" stays after the last sample beyond full scale. */
export const OVERLOAD_S = 3
