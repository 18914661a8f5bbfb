import { useQuery } from '@tanstack/react-query';
import { fitForUse, sayFit, type PictureSize } from '../../../../api/domain/fit-for-use.ts';
import { QueryView } from '../../ui/query-view.tsx';
import { usesQuery } from './queries.ts';

/** What a picture is good for: every use of the studio, and whether it is sharp there. */
export function FitList({ picture }: { picture: PictureSize }) {
  return (
    <QueryView query={useQuery(usesQuery)} isEmpty={({ uses }) => uses.length === 0} empty={<NoUses />}>
      {({ uses }) => (
        <dl>
          {uses.map((use) => {
            const fit = fitForUse(picture, use);
            return (
              <div key={use.id} className="flex justify-between gap-4 border-b border-hair py-1.5">
                <dt className="min-w-0">{use.title}</dt>
                <dd className={`min-w-0 text-right font-bold ${fit.sharp ? 'text-verdigris' : 'text-copper'}`}>{sayFit(fit)}</dd>
              </div>
            );
          })}
        </dl>
      )}
    </QueryView>
  );
}

function NoUses() {
  return <p className="py-1.5 text-mute">There are no uses in the settings.</p>;
}
