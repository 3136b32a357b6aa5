import { FrameReader } from '@hubtack/contracts/nmea/frame-reader.js';
import { readSentence } from '@hubtack/contracts/nmea/sentence.js';

/** Where a GGA sentence says the rover is; null when it says nothing of the kind. */
export function readPosition(gga: string): { latitude: number; longitude: number } | null {
  let place: { latitude: number; longitude: number } | null = null;
  const reader = new FrameReader();
  reader.push(new TextEncoder().encode(`${gga.trim()}\r\n`), {
    sentence: (bytes, start, end) => {
      const sentence = readSentence(bytes, start, end);
      if (sentence.type === 'gga' && sentence.latitude !== null && sentence.longitude !== null)
        place = { latitude: sentence.latitude, longitude: sentence.longitude };
    },
    fault: () => undefined,
    noise: () => undefined,
  });
  return place;
}
