/** Names of the columns that a point's own geometry gives, beside those of its attributes. */
export const POINT_DEGREES = { x: "point longitude", y: "point latitude" } as const;
export const POINT_PLANE = { x: "point x", y: "point y" } as const;
/** Of an area that carries a reading: what a swath's polygon covers, m2. Comes after the columns of the attributes. */
export const SHAPE_AREA = "area of its shape (m²)";
