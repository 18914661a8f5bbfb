import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import type { OpenLinkTerms } from '../../../../api/contract/open-links.ts';
import type { ChangeSheet, InviteGuests, ReopenSheet, StudioSheet } from '../../../../api/contract/sheets.ts';
import { api } from '../../lib/api.ts';
import { showNotice } from '../../ui/notices.tsx';
import { commissionKeys } from '../commissions/queries.ts';
import { frameKeys } from '../frames/queries.ts';
import { sheetKeys } from './queries.ts';

/** What can be done to a sheet, each with the request that does it. Every answer is the sheet as it then is. */
export type SheetDeed =
  | { what: 'change'; version: number; input: ChangeSheet }
  | { what: 'order'; proofIds: string[] }
  | { what: 'hang'; proofIds: string[]; viewId: string | null }
  | { what: 'take-off'; proofIds: string[] }
  | { what: 'put'; frameIds: string[] }
  | { what: 'issue' | 'guests'; input: InviteGuests }
  | { what: 'remind'; words: string }
  | { what: 'send-again'; guestId: string; words: string }
  | { what: 'withdraw-guest' | 'restore-guest'; guestId: string }
  | { what: 'show-bracket'; bracketId: string; shows: 'merged' | 'lead' }
  | { what: 'switch-open-link-on' | 'change-open-link'; input: OpenLinkTerms }
  | { what: 'withdraw-open-link' }
  | { what: 'withdraw' | 'restore' }
  | { what: 'reopen'; input: ReopenSheet };

async function request(sheetId: string, deed: SheetDeed): Promise<StudioSheet> {
  const at = `/api/sheets/${sheetId}`;
  switch (deed.what) {
    case 'change':
      return api.patch(at, deed.input, { version: deed.version });
    case 'order':
      return api.put(`${at}/order`, { proofIds: deed.proofIds });
    case 'hang':
      return api.post(`${at}/hang`, { proofIds: deed.proofIds, viewId: deed.viewId });
    case 'take-off':
      return api.post(`${at}/take-off`, { proofIds: deed.proofIds });
    case 'put':
      return api.post(`${at}/proofs`, { frameIds: deed.frameIds });
    case 'issue':
    case 'guests':
    case 'reopen':
      return api.post(`${at}/${deed.what}`, deed.input);
    case 'remind':
      return api.post(`${at}/remind`, { words: deed.words });
    case 'send-again':
      return api.post(`${at}/guests/${deed.guestId}/send-again`, { words: deed.words });
    case 'withdraw-guest':
      return api.post(`${at}/guests/${deed.guestId}/withdraw`);
    case 'switch-open-link-on':
      return api.post(`${at}/open-link`, deed.input);
    case 'change-open-link':
      return api.patch(`${at}/open-link`, deed.input);
    case 'withdraw-open-link':
      return api.post(`${at}/open-link/withdraw`);
    case 'show-bracket':
      await api.patch(`/api/brackets/${deed.bracketId}`, { shows: deed.shows });
      return api.get(at);
    case 'restore-guest':
      return api.post(`${at}/guests/${deed.guestId}/restore`);
    default:
      return api.post(`${at}/${deed.what}`);
  }
}

/** Does something to a sheet and shows it as it then is. */
export function useSheetDeed(sheet: { id: string; commissionId: string }) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (deed: SheetDeed) => request(sheet.id, deed),
    onSuccess: (changed, deed) => {
      client.setQueryData(sheetKeys.one(sheet.id), changed);
      void client.invalidateQueries({ queryKey: sheetKeys.lists(sheet.commissionId) });
      void client.invalidateQueries({ queryKey: sheetKeys.preview(sheet.id) });
      void client.invalidateQueries({ queryKey: commissionKeys.one(sheet.commissionId) });
      if (deed.what === 'show-bracket') void client.invalidateQueries({ queryKey: frameKeys.brackets(sheet.commissionId) });
    },
    // Somebody changed it meanwhile: show the newer state below what was typed.
    onError: () => void client.invalidateQueries({ queryKey: sheetKeys.one(sheet.id) }),
  });
}

/** Removes a draft and goes to the sheet before it. */
export function useRemoveSheet(sheet: { id: string; commissionId: string; number: number }) {
  const client = useQueryClient();
  const navigate = useNavigate();
  return useMutation({
    mutationFn: () => api.delete<void>(`/api/sheets/${sheet.id}`),
    onSuccess: async () => {
      await navigate(`/commissions/${sheet.commissionId}/proofs`);
      void client.invalidateQueries({ queryKey: sheetKeys.lists(sheet.commissionId) });
      void client.invalidateQueries({ queryKey: commissionKeys.one(sheet.commissionId) });
      showNotice(`The draft of proof sheet ${sheet.number} is removed. Its frames are still under Frames.`);
    },
  });
}
