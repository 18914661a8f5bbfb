import { z } from 'zod';

/** From where on a frame is pointed out; the same shape as domain/check-thresholds.ts, where the units stand. */
export const CheckThresholds = z
  .object({
    clippedPercent: z.number().min(0.1).max(100),
    blockedPercent: z.number().min(0.1).max(100),
    handSpeed: z.number().min(1).max(8000),
    tripodFrom: z.number().min(0.01).max(60),
    sharpFrom: z.number().min(0).max(20),
    tiltDegrees: z.number().min(0.2).max(10),
    convergingDegrees: z.number().min(0.2).max(45),
    apertureFrom: z.number().min(0.7).max(90),
    apertureTo: z.number().min(0.7).max(90),
    daylightFrom: z.number().min(-6).max(20),
    isoAbove: z.number().int().min(25).max(10_000_000),
    alikeBits: z.number().int().min(0).max(20),
  })
  .refine(({ apertureFrom, apertureTo }) => apertureFrom <= apertureTo, {
    path: ['apertureTo'],
    message: 'The larger f-number comes second.',
  });
export type CheckThresholds = z.infer<typeof CheckThresholds>;
