import type { WatermarkSettings } from '../../domain/watermark-settings.ts';
import { problem } from '../../middleware/problem.ts';

/** A key comes from the browser: it must name a watermark of this studio and nothing else. */
export function ownImage(scope: { studioId: string }, watermark: WatermarkSettings): void {
  const key = watermark.imageKey;
  if (watermark.kind !== 'image' || !key) return;
  const ours = key.startsWith(`studios/${scope.studioId}/watermarks/`) && /\/[0-9a-f]{64}\.png$/.test(key) && key.split('/').length === 4;
  if (!ours) throw problem(422, 'Upload the PNG of the watermark again.');
}
