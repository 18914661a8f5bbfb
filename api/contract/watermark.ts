import { z } from 'zod';
import type { Operation } from './operation.ts';

/** How the studio's name is laid over its proofs; the same shape as domain/watermark-settings.ts. */
export const Watermark = z
  .object({
    kind: z.enum(['none', 'text', 'image']),
    text: z.string().trim().max(60, 'At most 60 characters.').default(''),
    imageKey: z.string().max(200).nullish(),
    opacity: z.number().min(0.05).max(1),
    size: z.number().min(0.1).max(1),
    tiled: z.boolean(),
  })
  .refine((mark) => mark.kind !== 'text' || mark.text.length > 0, { path: ['text'], message: 'Write the words of the watermark.' })
  .refine((mark) => mark.kind !== 'image' || Boolean(mark.imageKey), { path: ['imageKey'], message: 'Upload a PNG for the watermark.' });
export type Watermark = z.infer<typeof Watermark>;

/** A picture to try a watermark on: one of the studio's frames, or a plain grey field where none is named. */
export const PreviewWatermark = z.object({ watermark: Watermark, frameId: z.uuid().optional() });
export type PreviewWatermark = z.infer<typeof PreviewWatermark>;

export const WatermarkImage = z.object({ imageKey: z.string(), width: z.number().int(), height: z.number().int() });
export type WatermarkImage = z.infer<typeof WatermarkImage>;

export const watermarkOperations: Operation[] = [
  { method: 'get', path: '/api/studio/watermark', summary: 'The watermark that new sheets begin with', who: 'staff', answer: Watermark },
  {
    method: 'put',
    path: '/api/studio/watermark',
    summary: 'Change the watermark that new sheets begin with',
    who: 'staff',
    body: Watermark,
    answer: Watermark,
  },
  {
    method: 'post',
    path: '/api/studio/watermark-images',
    summary: 'Upload a PNG as watermark',
    who: 'staff',
    file: 'image',
    answer: WatermarkImage,
    status: 201,
  },
  {
    method: 'post',
    path: '/api/studio/watermark-previews',
    summary: 'See a watermark on a picture of 960 px',
    who: 'staff',
    body: PreviewWatermark,
    answer: 'image/jpeg',
  },
];
