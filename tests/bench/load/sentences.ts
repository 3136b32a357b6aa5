import { gga } from '../../harness/sentences.js';

/** Hands out seconds that have not been used: every sentence of a run is a new epoch, in order, within twelve hours of now. */
export class Seconds {
  private next = Math.floor(Date.now() / 1000) - 11 * 3600;

  /** Sentences of the next `count` seconds as one block. */
  block(count: number): Buffer {
    let text = '';
    for (let at = 0; at < count; at++) text += gga(this.next++ * 1000);
    return Buffer.from(text, 'latin1');
  }
}
