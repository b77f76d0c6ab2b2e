import { z } from 'zod';

/** One open span of a day in wall-clock minutes after the site's midnight. */
const openSpanSchema = z
  .strictObject({
    fromMin: z.number().int().min(0).max(1439),
    toMin: z.number().int().min(1).max(1440),
  })
  .refine((span) => span.fromMin < span.toMin, 'Hours must end after they start.');

/** An empty list is a closed day. */
export const dayHoursSchema = z.array(openSpanSchema);
export type DayHours = z.infer<typeof dayHoursSchema>;

/** Index 1 = Monday … 7 = Sunday; a day without entry is closed. */
export const weekHoursSchema = z.partialRecord(
  z.enum(['1', '2', '3', '4', '5', '6', '7']),
  dayHoursSchema,
);
export type WeekHours = z.infer<typeof weekHoursSchema>;
