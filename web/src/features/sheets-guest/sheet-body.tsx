import { memo, useCallback, useEffect, useMemo, useRef } from 'react';
import { useTranslation } from 'react-i18next';
import type { GuestProof, GuestSheet } from '../../../../api/contract/guest-sheets.ts';
import { joinClasses } from '../../ui/join-classes.ts';
import { StoreyWords } from '../../ui/storey.tsx';
import { useWidth } from '../../ui/use-width.ts';
import { VirtualRows, type VirtualRowsHandle } from '../../ui/virtual-rows.tsx';
import { marksOf, type PlaceOfPick, type ProofMarks } from '../marks/read-marks.ts';
import { ProofCard } from './proof-card.tsx';
import { layRows, measureSheet, type SheetRow, type Storey } from './sheet-rows.ts';
import { useSheetKeys } from './use-sheet-keys.ts';

export interface SheetBodyProps {
  storeys: Storey[];
  marks: ReadonlyMap<string, ProofMarks>;
  places: ReadonlyMap<string, PlaceOfPick>;
  role: GuestSheet['me']['role'];
  /** Undefined: look, but do not mark. */
  onMark?: ((proof: GuestProof, wanted: boolean) => void) | undefined;
  /** The address of a proof's own page; undefined: the pictures lead nowhere. */
  addressOf?: ((proof: GuestProof) => string) | undefined;
  /** The number of the proof that gets the focus when the sheet appears: the one that was looked at last. */
  comingFrom?: number | undefined;
  onPictureFailed?: (() => void) | undefined;
}

const WORDS_ABOVE = 84;
const BELOW_STOREY = 28;

function isCoarse(): boolean {
  return window.matchMedia('(pointer: coarse)').matches;
}

/** The building: a storey for each view, its words in the gutter, its proofs in justified rows. */
export function SheetBody({ storeys, comingFrom, ...rest }: SheetBodyProps) {
  const [columnRef, width] = useWidth();
  const measures = useMemo(() => measureSheet(width, window.innerHeight), [width]);
  const rows = useMemo(() => layRows(storeys, measures), [storeys, measures]);
  const caption = measures.stacked ? 60 : isCoarse() ? 56 : 44;
  const list = useRef<VirtualRowsHandle>(null);
  const { onKeyDown, focusProof } = useSheetKeys({ rows, gap: measures.gap, list, marks: rest.marks, onMark: rest.onMark });

  const arrived = useRef(false);
  useEffect(() => {
    if (arrived.current || comingFrom === undefined || rows.length === 0) return;
    arrived.current = true;
    // By the next frame the list is as high as its rows; before that the window cannot scroll to them.
    requestAnimationFrame(() => focusProof(comingFrom));
  }, [comingFrom, rows, focusProof]);

  const heightOf = useCallback(
    (index: number) => {
      const row = rows[index];
      if (!row) return 0;
      const ends = rows[index + 1]?.isFirst !== false;
      return (
        row.height +
        caption +
        (row.isFirst ? (measures.gutter === 0 ? WORDS_ABOVE : 15) : 0) +
        (ends ? BELOW_STOREY : measures.stacked ? 0 : measures.gap)
      );
    },
    [rows, caption, measures],
  );

  return (
    <div ref={columnRef} className="max-md:-mx-4" onKeyDown={onKeyDown}>
      <VirtualRows
        ref={list}
        count={rows.length}
        layoutKey={`${width}/${rows.length}`}
        heightOf={heightOf}
        keyOf={(index) => rows[index]?.proofs[0]?.id ?? String(index)}
        footHeight={72}
      >
        {(index) => {
          const row = rows[index];
          if (!row) return null;
          return <SheetRowView {...rest} row={row} index={index} measures={measures} ends={rows[index + 1]?.isFirst !== false} />;
        }}
      </VirtualRows>
    </div>
  );
}

interface RowProps extends Omit<SheetBodyProps, 'storeys' | 'comingFrom'> {
  row: SheetRow;
  index: number;
  measures: ReturnType<typeof measureSheet>;
  ends: boolean;
}

/** Drawn anew only when the sheet is: scrolling draws the rows that come and leaves the others alone. */
const SheetRowView = memo(function SheetRowView(props: RowProps) {
  const { row, index, measures, ends, marks, places, role, onMark, addressOf, onPictureFailed } = props;
  const { stacked, gutter, gap } = measures;
  return (
    <div
      className={joinClasses(row.isFirst && 'border-t border-ink', gutter > 0 && 'grid')}
      style={{ gridTemplateColumns: `${gutter}px minmax(0, 1fr)`, paddingBottom: ends ? BELOW_STOREY : stacked ? 0 : gap }}
    >
      <div className={joinClasses(stacked && 'px-4')}>{row.isFirst ? <WordsOf storey={row.storey} places={places} /> : null}</div>
      <div className={joinClasses('flex', row.isFirst && gutter > 0 && 'pt-3.5')} style={{ gap }}>
        {row.proofs.map((proof, at) => (
          <div key={proof.id} className="shrink-0" style={{ width: stacked ? '100%' : row.widths[at] }}>
            <ProofCard
              proof={proof}
              view={row.storey.title}
              marks={marksOf(marks, proof.id)}
              place={places.get(proof.id)}
              role={role}
              onMark={onMark}
              to={addressOf?.(proof)}
              width={Math.min(row.widths[at] ?? 0, (row.height * proof.width) / proof.height)}
              stacked={stacked}
              position={`${index}/${at}`}
              eager={index < 2}
              onPictureFailed={() => onPictureFailed?.()}
            />
          </div>
        ))}
      </div>
    </div>
  );
});

function WordsOf({ storey, places }: { storey: Storey; places: SheetBodyProps['places'] }) {
  const { t } = useTranslation();
  const count = storey.proofs.filter((proof) => places.has(proof.id)).length;
  const picked = count === 0 ? t('sheet.noneYet') : t('allowance.picked', { count });
  return (
    <StoreyWords
      lettering={storey.view === null ? picked : `${t('sheet.view', { number: storey.view })} · ${picked}`}
      title={storey.title || t('sheet.alsoMade')}
      note={storey.askedFor ? t('sheet.askedFor', { words: storey.askedFor }) : undefined}
    />
  );
}
