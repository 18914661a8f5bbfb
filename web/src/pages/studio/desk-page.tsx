import { useQuery } from '@tanstack/react-query';
import type { Desk } from '../../../../api/contract/desk.ts';
import { DeskGroupView } from '../../features/desk/desk-group.tsx';
import { deskQuery } from '../../features/desk/queries.ts';
import { formatBytes } from '../../lib/bytes.ts';
import { EmptyState } from '../../ui/empty-state.tsx';
import { LinkButton } from '../../ui/link-button.tsx';
import { PageTitle } from '../../ui/page-title.tsx';
import { QueryView } from '../../ui/query-view.tsx';
import { TitleBlock } from '../../ui/title-block.tsx';

function DeskBlock({ figures }: { figures: Desk['figures'] }) {
  return (
    <TitleBlock
      cells={[
        { label: 'Yours to do', value: figures.yours },
        { label: 'Waiting on clients', value: figures.theirs },
        { label: 'Links ending this week', value: figures.linksEnding },
        { label: 'Stored', value: `${formatBytes(figures.storedBytes)} of ${formatBytes(figures.storageBytes)}` },
      ]}
    />
  );
}

/** /desk: the first page of the studio. */
export function Component() {
  return (
    <>
      <div className="mb-4 flex flex-wrap items-center justify-between gap-3">
        <PageTitle title="Desk" />
        <LinkButton to="/commissions/new">New commission</LinkButton>
      </div>
      <QueryView query={useQuery(deskQuery)}>
        {(desk) => (
          <>
            <DeskBlock figures={desk.figures} />
            {desk.groups.every((group) => group.count === 0) ? (
              <div className="mt-6">
                <EmptyState
                  title="Nothing on the desk"
                  action={
                    <LinkButton to="/commissions/new" tone="first">
                      Begin a commission
                    </LinkButton>
                  }
                >
                  For every commission that is not closed its next step will stand here: whose it is, since when, and the button that does
                  it.
                </EmptyState>
              </div>
            ) : (
              desk.groups.map((group) => <DeskGroupView key={group.whose} group={group} />)
            )}
          </>
        )}
      </QueryView>
    </>
  );
}
