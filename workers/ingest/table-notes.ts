/** What was passed over while a file was read; grows as its rows come. */
export interface TableNotes {
  /** NMEA sentences that were not whole or had a wrong checksum. */
  damagedSentences?: number;
  firstDamagedLine?: number;
  /** The file breaks off in its last line, which was left out. */
  cutLine?: number;
}
