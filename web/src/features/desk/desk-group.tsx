import { Link } from 'react-router-dom';
import type { DeskGroup, DeskRow, Whose } from '../../../../api/contract/desk.ts';
import { joinClasses } from '../../ui/join-classes.ts';
import { Picture } from '../../ui/picture.tsx';
import { Storey } from '../../ui/storey.tsx';
import { DeskButton } from './desk-action.tsx';
import { whenWords } from './when-words.ts';

const WORDS: Record<Whose, { lettering: string; title: string; none: string }> = {
  yours: { lettering: 'Yours', title: 'To do next', none: 'Nothing waits for you.' },
  theirs: { lettering: 'Theirs', title: 'Waiting on clients', none: 'No client has anything to do.' },
  settled: { lettering: 'Settled', title: 'Delivered', none: 'Nothing delivered yet.' },
};

/** The same columns in every group, so that they line up down the page. */
const COLUMNS =
  'grid grid-cols-[84px_minmax(0,1fr)_auto] items-center gap-x-4 gap-y-1 lg:grid-cols-[84px_minmax(0,5fr)_minmax(0,7fr)_144px_140px]';

/** One group of the desk as a storey. */
export function DeskGroupView({ group }: { group: DeskGroup }) {
  const words = WORDS[group.whose];
  return (
    <Storey lettering={words.lettering} title={words.title} gutter="narrow" className="mt-6">
      {group.rows.length === 0 ? (
        <p className="bg-sheet px-3.5 py-4 text-mute">{words.none}</p>
      ) : (
        <ul>
          {group.rows.map((row, at) => (
            <DeskLine key={row.commission.id} row={row} whose={group.whose} first={group.whose === 'yours' && at === 0} />
          ))}
        </ul>
      )}
      {group.count > group.rows.length ? (
        <p className="px-3.5 py-3 text-13 text-mute">
          {group.count - group.rows.length} more stand in the{' '}
          <Link to="/commissions" className="underline">
            list of commissions
          </Link>
          .
        </p>
      ) : null}
    </Storey>
  );
}

function DeskLine({ row, whose, first }: { row: DeskRow; whose: Whose; first: boolean }) {
  const { commission, when } = row;
  return (
    <li className={joinClasses(COLUMNS, 'border-b border-line bg-sheet px-3.5 py-2')}>
      <span className="row-span-3 self-center lg:row-span-1">
        <RowPicture picture={row.picture} />
      </span>
      <span className="col-start-2 min-w-0 lg:col-start-auto">
        <Link to={`/commissions/${commission.id}/brief`} className="block font-bold wrap-break-word hover:underline">
          {commission.title}
        </Link>
        <span className="block text-13 text-mute wrap-break-word">{commission.client}</span>
      </span>
      <Says says={row.says} whose={whose} />
      <span className={joinClasses('col-start-2 text-13 lg:col-start-auto', when?.urgent ? 'font-bold text-copper' : 'text-mute')}>
        {when ? whenWords(when) : ''}
      </span>
      <span className="col-start-3 row-span-3 row-start-1 justify-self-end lg:col-start-auto lg:row-span-1 lg:row-start-auto">
        <DeskButton row={row} first={first} />
      </span>
    </li>
  );
}

function Says({ says, whose }: { says: string; whose: Whose }) {
  const [head, ...rest] = says.split(' · ');
  return (
    <span className="col-start-2 wrap-break-word lg:col-start-auto">
      {whose === 'settled' ? <b className="text-verdigris">{head}</b> : head}
      {rest.map((part) => ` · ${part}`)}
    </span>
  );
}

/** Never cropped: the picture stands whole within the space of 84 by 56. */
function RowPicture({ picture }: { picture: DeskRow['picture'] }) {
  if (!picture) return <span className="block h-14 w-[84px] border border-dashed border-line" aria-hidden="true" />;
  const width = Math.min(84, Math.round((56 * picture.width) / picture.height));
  return (
    <span className="flex h-14 w-[84px] items-center">
      <span style={{ width }}>
        <Picture
          source={{ small: picture.small, width: picture.width, height: picture.height, thumbhash: picture.placeholder }}
          alt=""
          drawnWidth={width}
        />
      </span>
    </span>
  );
}
