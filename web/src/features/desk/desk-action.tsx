import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import type { DeskRow } from '../../../../api/contract/desk.ts';
import { api } from '../../lib/api.ts';
import { Button } from '../../ui/button.tsx';
import { ConfirmDialog } from '../../ui/confirm-dialog.tsx';
import { LinkButton } from '../../ui/link-button.tsx';
import { showNotice } from '../../ui/notices.tsx';
import { commissionKeys } from '../commissions/queries.ts';
import { deskQuery } from './queries.ts';

/** The button that does the next step: it goes there, or does it at once after asking. */
export function DeskButton({ row, first }: { row: DeskRow; first: boolean }) {
  const { action, commission } = row;
  const name = `${action.words}: ${commission.title}`;
  if (!action.does) {
    return (
      <LinkButton to={`/commissions/${commission.id}/${action.step}`} size="small" tone={first ? 'first' : 'plain'} aria-label={name}>
        {action.words}
      </LinkButton>
    );
  }
  return <AtOnce row={row} name={name} />;
}

function AtOnce({ row: { action, commission }, name }: { row: DeskRow; name: string }) {
  const [asking, setAsking] = useState(false);
  const queries = useQueryClient();
  const reminds = action.does === 'remind';
  const act = useMutation({
    mutationFn: () =>
      reminds ? api.post(`/api/sheets/${action.sheetId}/remind`, { words: '' }) : api.post(`/api/commissions/${commission.id}/close`),
    onSuccess: () => {
      setAsking(false);
      showNotice(reminds ? `The guests of ${commission.title} get a mail.` : `${commission.title} is closed.`);
      void queries.invalidateQueries({ queryKey: deskQuery.queryKey });
      void queries.invalidateQueries({ queryKey: commissionKeys.all });
    },
  });
  return (
    <>
      <Button size="small" aria-label={name} onClick={() => setAsking(true)}>
        {action.words}
      </Button>
      <ConfirmDialog
        open={asking}
        dangerous={false}
        title={reminds ? `Remind the guests of ${commission.title}` : `Close ${commission.title}`}
        confirm={reminds ? 'Send the mails' : 'Close commission'}
        busy={act.isPending}
        error={act.error?.message}
        onConfirm={() => act.mutate()}
        onClose={() => setAsking(false)}
      >
        {reminds
          ? 'Everybody invited to the open proof sheet gets a mail with a new link; the link before stops working. To write your own words, remind them from the Proofs step.'
          : 'A closed commission leaves the desk and is read-only. It can be reopened at any time.'}
      </ConfirmDialog>
    </>
  );
}
