/** Temperature difference at which the soak ends and the voltage is matched, K. */
export const soakToleranceK = 0.1;

/** Voltage mismatch right after a match: likely and worst, V (worse sign each). */
export const likelyMismatchV = 2e-6;
export const worstMismatchV = 1e-5;

/** Standard deviation of the match, V, for screening. */
export const matchDeviationV = 2e-6;

/** Temperature at which the leakage by capacity is stated, °C. */
export const leakageReferenceC = 25;

/** Longest hold on offer, s (72 h). */
export const longestHoldS = 72 * 3600;

/** Share of the allowance that the noise of the reading may take, and of D that disturbances may. */
export const noiseShare = 1 / 4;
export const screeningShare = 1 / 4;

/** Cells come in from a room near this temperature, °C, and never closer than the handling offset, K. */
export const roomTemperatureC = 23;
export const handlingOffsetK = 2;

/** Grid of starts, ends and attended phases, s (15 min). */
export const bookingGridS = 900;
