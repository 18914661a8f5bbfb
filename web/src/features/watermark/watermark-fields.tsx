import { useMutation } from '@tanstack/react-query';
import type { Watermark, WatermarkImage } from '../../../../api/contract/watermark.ts';
import { api } from '../../lib/api.ts';
import { Checkbox } from '../../ui/checkbox.tsx';
import { Field } from '../../ui/field.tsx';
import { TextInput } from '../../ui/text-input.tsx';

interface Props {
  value: Watermark;
  onChange: (value: Watermark) => void;
  disabled?: boolean;
}

const KINDS: { value: Watermark['kind']; words: string }[] = [
  { value: 'text', words: 'Words' },
  { value: 'image', words: 'A picture (PNG)' },
  { value: 'none', words: 'No watermark' },
];

/** How the studio's name is laid over the proofs: words or a picture, how strong, how large, once or repeated. */
export function WatermarkFields({ value, onChange, disabled }: Props) {
  const set = (part: Partial<Watermark>) => onChange({ ...value, ...part });
  return (
    <fieldset disabled={disabled} className="grid gap-4">
      <legend className="sr-only">Watermark</legend>
      <div role="radiogroup" aria-label="Kind of watermark" className="flex flex-wrap gap-x-5">
        {KINDS.map((kind) => (
          <Checkbox
            key={kind.value}
            kind="radio"
            name="watermark-kind"
            label={kind.words}
            checked={value.kind === kind.value}
            onChange={() => set({ kind: kind.value })}
          />
        ))}
      </div>
      {value.kind === 'text' ? (
        <Field label="Words" error={value.text.trim() ? undefined : 'Write the words of the watermark.'}>
          {(control) => (
            <TextInput {...control} maxLength={60} value={value.text} onChange={(event) => set({ text: event.target.value })} />
          )}
        </Field>
      ) : null}
      {value.kind === 'image' ? <ImageField imageKey={value.imageKey} onUploaded={(imageKey) => set({ imageKey })} /> : null}
      {value.kind === 'none' ? (
        <p className="text-13 text-mute">Your guests then see clean pictures of 2560 px. Whoever sees them can keep them.</p>
      ) : (
        <>
          <Slider label="Strength" value={value.opacity} min={0.05} onChange={(opacity) => set({ opacity })} />
          <Slider label="Size" value={value.size} min={0.1} onChange={(size) => set({ size })} />
          <Checkbox
            label="Repeat it over the whole picture"
            checked={value.tiled}
            onChange={(event) => set({ tiled: event.target.checked })}
          />
        </>
      )}
    </fieldset>
  );
}

function Slider({ label, value, min, onChange }: { label: string; value: number; min: number; onChange: (value: number) => void }) {
  return (
    <Field label={`${label}: ${Math.round(value * 100)}%`}>
      {(control) => (
        <input
          {...control}
          type="range"
          min={min}
          max={1}
          step={0.05}
          value={value}
          className="target w-full accent-ink"
          onChange={(event) => onChange(Number(event.target.value))}
        />
      )}
    </Field>
  );
}

function ImageField({ imageKey, onUploaded }: { imageKey: string | null | undefined; onUploaded: (key: string) => void }) {
  const upload = useMutation({
    mutationFn: (file: File) => {
      const form = new FormData();
      form.set('image', file);
      return api.post<WatermarkImage>('/api/studio/watermark-images', form);
    },
    onSuccess: (image) => onUploaded(image.imageKey),
  });
  const hint = upload.isPending
    ? 'Uploading …'
    : imageKey
      ? 'A picture is there. Choose another to replace it.'
      : 'With a transparent ground, at most 5 MB.';
  return (
    <Field label="Picture" hint={hint} error={upload.error?.message}>
      {(control) => (
        <input
          {...control}
          type="file"
          accept="image/png"
          className="target w-full"
          onChange={(event) => {
            const file = event.target.files?.[0];
            if (file) upload.mutate(file);
          }}
        />
      )}
    </Field>
  );
}
