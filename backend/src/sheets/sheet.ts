import type { FixState } from '@hubtack/contracts/fixes/fix-state.js';

export interface Segment {
  /** Which colour; null: ink. Words beside the bar say the same. */
  state: FixState | null;
  /** Of the whole width, 0 to 1. */
  share: number;
}
export interface Bar {
  label: string;
  value: string;
  segments: readonly Segment[];
  /** All that the bar shows, in words and numbers. */
  words: readonly string[];
}

/** A sheet as what it says, in order: both parts of its mail are written from this, so that they carry the same. */
export type SheetPart =
  | { kind: 'lead' | 'heading' | 'paragraph' | 'caution'; text: string }
  | { kind: 'figures'; lines: readonly { label: string; value: string }[] }
  | { kind: 'bars'; bars: readonly Bar[] }
  /** The last row is the sum of those above it. */
  | { kind: 'table'; head: readonly string[]; rows: readonly (readonly string[])[] }
  | { kind: 'link'; text: string; url: string };

export interface Sheet {
  subject: string;
  /** Above the lead: which firm, which days. */
  line: string;
  parts: readonly SheetPart[];
}

export interface SheetMail {
  subject: string;
  text: string;
  html: string;
}
