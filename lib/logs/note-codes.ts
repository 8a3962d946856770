/** Code of the note on a log that lies outside its field. */
export const OUTSIDE_FIELD = "outside-field";
/** Code of the note on rows whose order, row 1 left, nothing on the ground confirms. */
export const ROW_ORDER_UNCHECKED = "row-order-unchecked";
