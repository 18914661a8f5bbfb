import { describe, expect, it } from 'vitest';
import { commissionState, type CommissionFacts } from '../../api/domain/commission-state.ts';
import { sheetState, type SheetMoments } from '../../api/domain/sheet-state.ts';

const NOW = new Date('2026-12-01T12:00:00Z');

describe('the state of a sheet', () => {
  const sheet = (moments: Partial<SheetMoments>) => sheetState({ issuedAt: null, sentAt: null, endsAt: null, ...moments }, NOW);
  const issuedAt = '2026-11-20T09:00:00Z';

  it.each<[string, Partial<SheetMoments>, string]>([
    ['not issued yet', {}, 'Draft'],
    ['not issued, last date gone by', { endsAt: '2026-11-01T00:00:00Z' }, 'Draft'],
    ['issued', { issuedAt }, 'Open'],
    ['before its last date', { issuedAt, endsAt: '2026-12-01T12:00:01Z' }, 'Open'],
    ['at the moment it ends', { issuedAt, endsAt: NOW }, 'Ended'],
    ['sent', { issuedAt, sentAt: '2026-11-25T10:00:00Z' }, 'Sent'],
    ['sent, last date gone by', { issuedAt, sentAt: '2026-11-25T10:00:00Z', endsAt: '2026-11-30T00:00:00Z' }, 'Sent'],
    ['withdrawn', { issuedAt, withdrawnAt: NOW }, 'Ended'],
  ])('%s', (_name, moments, state) => {
    expect(sheet(moments)).toBe(state);
  });
});

describe('the state of a commission', () => {
  const nothing: CommissionFacts = { closed: false, sheets: [], picks: 0, picksWithFinal: 0, finals: 0, finalsDelivered: 0 };

  it.each<[string, Partial<CommissionFacts>, string]>([
    ['without anything', {}, 'Preparing'],
    ['with a draft sheet', { sheets: ['Draft'] }, 'Preparing'],
    ['with an open sheet', { sheets: ['Open'] }, 'With client'],
    ['whose sheet ended without an answer', { sheets: ['Ended'] }, 'With client'],
    ['whose pick list came', { sheets: ['Sent'], picks: 12 }, 'Picks in'],
    ['with some finals', { sheets: ['Sent'], picks: 12, picksWithFinal: 5, finals: 5 }, 'Finishing'],
    ['with further finals only', { sheets: ['Sent'], picks: 12, finals: 2 }, 'Finishing'],
    ['with every final', { sheets: ['Sent'], picks: 12, picksWithFinal: 12, finals: 13 }, 'Ready'],
    ['delivered in part', { sheets: ['Sent'], picks: 12, picksWithFinal: 12, finals: 12, finalsDelivered: 5 }, 'Ready'],
    ['delivered', { sheets: ['Sent'], picks: 12, picksWithFinal: 12, finals: 12, finalsDelivered: 12 }, 'Delivered'],
    ['without proofing, finals in', { finals: 8 }, 'Ready'],
    ['without proofing, delivered', { finals: 8, finalsDelivered: 8 }, 'Delivered'],
    ['whose sheet was reopened', { sheets: ['Open'], picks: 12, picksWithFinal: 3, finals: 3 }, 'With client'],
    ['closed', { closed: true, sheets: ['Open'] }, 'Closed'],
  ])('%s', (_name, facts, state) => {
    expect(commissionState({ ...nothing, ...facts })).toBe(state);
  });
});
