/** Faults of the caster itself; they can be combined. Absent: well. */
export interface CasterFaults {
  /** Takes connections and says nothing. */
  mute?: boolean;
  /** The table has no ENDSOURCETABLE; the connection is closed after it, or kept open. */
  tableWithoutEnd?: 'closed' | 'kept';
  /** The table goes on without end. */
  endlessTable?: boolean;
  /** So many bytes without a line end before anything else. */
  bannerBytes?: number;
  /** Sends clients on to this address. */
  redirectTo?: string;
  /** Bodies of version 2 answers are compressed, whether the client can read that or not. */
  gzip?: boolean;
  /** A web page instead of a table. */
  webPage?: boolean;
  /** The table as this text. */
  tableText?: string;
  /** Records in the table as some casters have them: too short, 0 to 360 degrees, no position, UTF-8. */
  oddTable?: boolean;
  /** Stream answers of version 1 without a blank line after ICY. */
  noBlankLine?: boolean;
  /** More header lines in every answer, behind ICY too. */
  extraHeaders?: string[];
  /** Answers version 2 requests as a version 1 caster does. */
  onlyVersion1?: boolean;
  /** The table is shown with a login only. */
  tableNeedsLogin?: boolean;
}
