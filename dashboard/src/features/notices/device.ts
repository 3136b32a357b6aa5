import type { NoticeWay } from '@hubtack/contracts/notices/notice.js';

/** Ways that happen on the device, each switched on there. */
export const deviceWays = ['sound', 'speech', 'browser'] as const;
export type DeviceWay = (typeof deviceWays)[number];

const keyOf = (way: DeviceWay) => `hubtack:notice:${way}`;

export const isOn = (way: DeviceWay): boolean => {
  const isThere =
    way === 'sound' || (way === 'speech' ? 'speechSynthesis' in globalThis : 'Notification' in globalThis);
  return isThere && localStorage.getItem(keyOf(way)) === 'on';
};

export function switchWay(way: DeviceWay, on: boolean): void {
  if (on) localStorage.setItem(keyOf(way), 'on');
  else localStorage.removeItem(keyOf(way));
}

const TONE_SECONDS = 0.18;
/** A rising pair of tones: heard through an office, and no siren. */
const TONES_HZ = [523.25, 783.99];

export function sound(): void {
  const context = new AudioContext();
  for (const [index, hertz] of TONES_HZ.entries()) {
    const at = context.currentTime + index * TONE_SECONDS;
    const tone = context.createOscillator();
    const volume = context.createGain();
    tone.frequency.value = hertz;
    volume.gain.setValueAtTime(0.0001, at);
    volume.gain.exponentialRampToValueAtTime(0.25, at + 0.02);
    volume.gain.exponentialRampToValueAtTime(0.0001, at + TONE_SECONDS);
    tone.connect(volume).connect(context.destination);
    tone.start(at);
    tone.stop(at + TONE_SECONDS);
  }
  setTimeout(() => void context.close(), 1000);
}

export function speak(text: string): void {
  const words = new SpeechSynthesisUtterance(text);
  words.lang = 'en';
  speechSynthesis.speak(words);
}

/** Does what the notice asks for and this device allows. */
export function tellOnDevice(text: string, ways: readonly NoticeWay[]): void {
  const does = (way: DeviceWay) => ways.includes(way) && isOn(way);
  if (does('sound')) sound();
  if (does('speech')) speak(text);
  if (does('browser') && Notification.permission === 'granted')
    new Notification('Hubtack', { body: text, icon: '/mark.svg' });
}
