import type { SetUpCard, SetUpCardBody } from '@hubtack/contracts/set-up/set-up-card.js';
import { useQueryClient } from '@tanstack/react-query';
import { ApiError } from '../../lib/api';
import { sendSetUpCard, setUpKey, setUpPath, setUpStartQuery } from '../../lib/set-up';
import { useMe } from '../../lib/session';
import { newId } from '../../offline/new-id';
import { taps } from '../../offline/taps';

/** Sends a card; without signal a chief's phone keeps it and sends it later. Answers which of the two. */
export function useSaveCard() {
  const client = useQueryClient();
  const { role, userId, name } = useMe();
  return async (card: SetUpCardBody): Promise<{ saved: SetUpCard } | 'waiting'> => {
    const at = Date.now();
    const body = { ...card, at: new Date(at).toISOString() };
    // One key for both ways: what arrived although its answer got lost is not kept twice.
    const id = newId();
    try {
      const saved = await sendSetUpCard(body, id);
      await client.invalidateQueries({ queryKey: setUpKey });
      return { saved };
    } catch (error) {
      const isOffline = error instanceof ApiError && error.code === 'offline';
      if (!isOffline || role !== 'crewChief') throw error;
    }
    const words = `Set-up card, pole ${card.poleHeightM.toFixed(3)} m`;
    await taps.add([
      { id, userId: userId!, at, words, kind: 'setUp', url: setUpPath, body, under: null, refusal: null },
    ]);
    // The next one on this phone is compared with the one that waits.
    client.setQueryData(setUpStartQuery(card.roverId).queryKey, (start) => {
      if (!start) return start;
      const source = start.choices.find((one) => one.id === card.correctionSourceId);
      const waiting: SetUpCard = {
        ...body,
        id: start.card?.id ?? 0,
        roverLabel: start.card?.roverLabel ?? '',
        crewId: null,
        by: name,
        sourceName: source?.name ?? null,
        mountPoint: source?.mountPoint ?? null,
      };
      return { ...start, card: waiting };
    });
    return 'waiting';
  };
}
