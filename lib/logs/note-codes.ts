/** Code of the note on a log that lies outside its field. */
export const OUTSIDE_FIELD = "outside-field";
