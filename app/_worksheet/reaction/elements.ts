/**
 * Element symbols 1 to 118 (IUPAC), with D and T for the isotopes of hydrogen, which balance on their own:
 * an exchange written with D2O must not pass as one written with H2O.
 */
const SYMBOLS =
  "H D T He Li Be B C N O F Ne Na Mg Al Si P S Cl Ar K Ca Sc Ti V Cr Mn Fe Co Ni Cu Zn Ga Ge As Se Br Kr " +
  "Rb Sr Y Zr Nb Mo Tc Ru Rh Pd Ag Cd In Sn Sb Te I Xe Cs Ba La Ce Pr Nd Pm Sm Eu Gd Tb Dy Ho Er Tm Yb Lu " +
  "Hf Ta W Re Os Ir Pt Au Hg Tl Pb Bi Po At Rn Fr Ra Ac Th Pa U Np Pu Am Cm Bk Cf Es Fm Md No Lr " +
  "Rf Db Sg Bh Hs Mt Ds Rg Cn Nh Fl Mc Lv Ts Og";

const elements = new Set(SYMBOLS.split(" "));

export function isElement(symbol: string): boolean {
  return elements.has(symbol);
}

/** Hill order: carbon, hydrogen, then the alphabet. */
export function compareElements(left: string, right: string): number {
  return hillRank(left) - hillRank(right) || (left < right ? -1 : left > right ? 1 : 0);
}

function hillRank(symbol: string): number {
  return symbol === "C" ? 0 : symbol === "H" ? 1 : 2;
}
