/** Two positions closer than this are the same point: numerical noise of double arithmetic on parts up to some metres, mm. */
export const COINCIDENT_MM = 1e-6;

/** Ends of an arc nearer than this are the same point and the arc a full circle; far below any arc that is cut off on purpose, mm. */
export const FULL_CIRCLE_MM = 1e-9;

/** An arc that rises less than this over its chord is straight: a thousandth of what counts as the same point, mm. */
export const FLAT_ARC_MM = 1e-9;

/** A line drawn by hand or traced may miss the edge it is meant to reach by this much and is still taken to reach it, mm. */
export const JOIN_MM = 1;

/** Largest distance between an arc and the chords that stand for it, where an algorithm or a screen needs chords, mm. */
export const CHORD_MM = 0.05;

/** Edges shorter than this cannot be drawn, cut or chosen on purpose, mm. */
export const TINY_EDGE_MM = 1e-4;

/** Areas below this are left-overs of arithmetic, mm2. */
export const TINY_AREA_MM2 = 1e-9;

/** Angles that differ by less are equal, degrees. */
export const COINCIDENT_DEG = 1e-9;

/** Corners this near to a triangle's edge, mm, are the ones that a triangulation took for part of it. */
export const ON_EDGE_MM = 1e-9;

/** A search for the nearest point has ended when it gets closer by less than this share of the squared distance. */
export const NO_PROGRESS_SHARE = 1e-12;

/** Triangles whose squared area is below this share of their sides' squares have no plane. */
export const NO_PLANE_SHARE = 1e-14;
