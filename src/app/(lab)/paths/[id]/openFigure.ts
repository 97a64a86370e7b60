/** Which figure of the sheet shows its working. */
export type OpenFigure =
  | { kind: 'total'; correction: number; frequencyHz: number }
  /** Expanded uncertainty of a range, by its place in the record. */
  | { kind: 'expanded'; of: number }
  /** What one contribution adds to it. */
  | { kind: 'contribution'; of: number; row: number };
