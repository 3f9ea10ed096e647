/**
 * A quarter of an em, between the factors of a unit and about ± and × in tables. In these families a thin space
 * (U+2009) is so narrow that "µmol L" runs together at the size of a column head.
 */
export const NARROW_SPACE = "\u2005";
