import { useQuery } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import type { GuestSheet, SentPickList } from '../../../../api/contract/guest-sheets.ts';
import { formatTime } from '../../lib/dates.ts';
import { LinkButton } from '../../ui/link-button.tsx';
import { PageTitle } from '../../ui/page-title.tsx';
import { QueryView } from '../../ui/query-view.tsx';
import { marksOf } from '../marks/read-marks.ts';
import { pickListsQuery } from '../sheets-guest/queries.ts';
import type { SheetData } from '../sheets-guest/sheet-door.tsx';
import { PickRow } from './pick-row.tsx';
import { Sums } from './sums.tsx';

/** After sending, and whenever one looks again: what the studio has, and what happens next. */
export function SentWords({ data }: { data: SheetData }) {
  const { t } = useTranslation();
  const { sheet } = data;
  const query = useQuery(pickListsQuery(sheet.id));
  return (
    <QueryView query={query} isEmpty={({ items }) => items.length === 0} empty={<PageTitle title={t('review.nothingSent')} />}>
      {({ items }) => {
        const newest = items.reduce((one, other) => (other.number > one.number ? other : one), items[0] as SentPickList);
        return <SentList data={data} list={newest} />;
      }}
    </QueryView>
  );
}

function NextSteps({ sheet }: { sheet: GuestSheet }) {
  const { t } = useTranslation();
  return (
    <ol className="mt-5 list-decimal border-t border-ink pt-3 pl-5">
      <li className="mb-1">{t('review.next1', { studio: sheet.studio.name })}</li>
      <li className="mb-1">{t('review.next2')}</li>
      <li>
        {t('review.next3')}{' '}
        <a href={`mailto:${sheet.studio.replyTo}`} className="target inline-flex items-center underline underline-offset-2">
          {t('sheet.writeTo', { studio: sheet.studio.name })}
        </a>
      </li>
    </ol>
  );
}

function SentList({ data, list }: { data: SheetData; list: SentPickList }) {
  const { t } = useTranslation();
  const { sheet, proofs, storeys, marks } = data;
  const sent = new Map(list.proofIds.map((id, at) => [id, { number: at + 1, extra: at >= list.allowance }]));
  const rows = proofs.filter((proof) => sent.has(proof.id));
  return (
    <div className="grid gap-x-10 gap-y-6 pb-10 lg:grid-cols-[minmax(0,1fr)_340px]">
      <div>
        <p className="lettering mt-3 font-bold text-verdigris">{t('review.sent')}</p>
        <PageTitle title={t('review.sentTitle', { number: list.number, studio: sheet.studio.name })} where={sheet.commission.title} />
        <p className="mt-2">{t('review.sentBy', { by: list.sentBy, when: formatTime(list.sentAt, sheet.studio.timeZone) })}</p>
        {list.words ? <blockquote className="mt-3 border-l-4 border-line pl-3 whitespace-pre-wrap">{list.words}</blockquote> : null}
        <NextSteps sheet={sheet} />
        <ul className="mt-5 border-t border-ink">
          {rows.map((proof) => (
            <PickRow
              key={proof.id}
              proof={proof}
              view={storeys.find((storey) => storey.proofs.includes(proof))?.title ?? ''}
              place={sent.get(proof.id) ?? { number: 0, extra: false }}
              marks={marksOf(marks, proof.id)}
              sheetId={sheet.id}
              onTakeOff={undefined}
            />
          ))}
        </ul>
      </div>
      <div>
        <Sums
          picks={list.picks}
          included={list.allowance}
          extraPrice={list.extraPrice}
          currency={list.currency}
          studio={sheet.studio.name}
        />
        <LinkButton to={`/sheets/${sheet.id}`} className="mt-3 w-full">
          {t('viewer.all')}
        </LinkButton>
      </div>
    </div>
  );
}
