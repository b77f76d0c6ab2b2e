/** Stands for "nobody knows until when": the start of 2100 (UTC), further than anything is booked. */
export const openEndMs = 4_102_444_800_000;
