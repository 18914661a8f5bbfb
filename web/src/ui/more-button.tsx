import { Button } from './button.tsx';

interface Props {
  query: { hasNextPage: boolean; isFetchingNextPage: boolean; fetchNextPage: () => unknown };
}

/** Below a list that comes in pages: the next one. Nothing on the last page. */
export function MoreButton({ query }: Props) {
  if (!query.hasNextPage) return null;
  return (
    <div className="mt-3 flex justify-center">
      <Button busy={query.isFetchingNextPage} onClick={() => void query.fetchNextPage()}>
        Show more
      </Button>
    </div>
  );
}
