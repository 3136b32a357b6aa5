import { z } from 'zod';

/** What the evidence points to, an explanation further up the chain first: mount point, corrections, sky, float. */
export const causes = [
  'mountPointDown',
  'wentQuiet',
  'notHeard',
  'neverCorrected',
  'correctionsStopped',
  'noPosition',
  'skyBlocked',
  'farFromBase',
  'notResolving',
  'unclear',
] as const;
export const cause = z.enum(causes);
export type Cause = z.infer<typeof cause>;

/** What a person confirms when a lost fix is closed; feeds the weekly report. `planned` is no loss. */
export const confirmedCauses = [...causes, 'baseStationFault', 'equipment', 'planned'] as const;
export const confirmedCause = z.enum(confirmedCauses);
export type ConfirmedCause = z.infer<typeof confirmedCause>;

export const causeLabels: Record<ConfirmedCause, string> = {
  mountPointDown: 'Corrections stopped for everyone on a mount point',
  wentQuiet: 'Nothing heard from the rover',
  notHeard: 'Not heard since the shift began',
  neverCorrected: 'No corrections since power-up',
  correctionsStopped: 'Corrections stopped on this rover',
  noPosition: 'No position at all',
  skyBlocked: 'Sky blocked',
  farFromBase: 'Far from the base',
  notResolving: 'Corrections and sky good, still float',
  unclear: 'Unclear',
  baseStationFault: 'Base station fault',
  equipment: 'Equipment',
  planned: 'Planned (not a loss)',
};

/** The first thing to try (common practice, no source): advice to people who know their trade. */
export const firstThings: Record<Cause, string> = {
  mountPointDown: 'Call the network operator. Move the crews to the next nearest mount point in range.',
  wentQuiet:
    'Call the crew: battery, Bluetooth or data link. Treat a person who does not answer by the firm’s lone-work rule.',
  notHeard: 'Is the rover switched on, and is this its crew today?',
  neverCorrected:
    'Check the correction login on the rover letter by letter: address, port, user, password, mount point. One mistyped character is the usual reason.',
  correctionsStopped: 'Look at mobile data: signal, SIM, hotspot. Reconnect the correction stream.',
  noPosition: 'Look at the antenna and its cable, at obstruction and interference. Restart the receiver.',
  skyBlocked:
    'Move into the open, wait a minute, come back. Use an offset or the total station for the blocked points.',
  farFromBase: 'Choose a nearer mount point, or a network one with a virtual base.',
  notResolving:
    'Re-initialise in the open. Check for reflecting surfaces, the message type, and that rover and mount point agree on constellations.',
  unclear: 'Look at the evidence together and ask the crew what they see.',
};
