import type { Composition } from './composition.ts';
import type { Gas, GasTables } from './gas.ts';
import { dissociationConstant } from './molecule-equilibrium.ts';
import { ionShares } from './saha.ts';

/** Densities (cm^-3) that the chemistry of a gas gives, per point. */
export interface Chemistry {
  /** By molecule. */
  readonly molecules: ReadonlyMap<string, Float64Array>;
  /** Share of the atoms of an element that is not bound in molecules (any ionisation), by atomic number. */
  readonly freeShare: ReadonlyMap<number, Float64Array>;
}

/** The elements that molecules can deplete. */
const C = 6;
const N = 7;
const O = 8;
const MG = 12;
const SI = 14;
const CA = 20;
const TI = 22;
const V = 23;
const ELEMENTS = [C, N, O, MG, SI, CA, TI, V];

/** The molecules and their partners; hydrogen (1) is so abundant that these do not deplete it. */
const MOLECULES: readonly (readonly [string, number, number])[] = [
  ['CO', C, O],
  ['CN', C, N],
  ['CH', C, 1],
  ['C2', C, C],
  ['OH', O, 1],
  ['NH', N, 1],
  ['N2', N, N],
  ['TiO', TI, O],
  ['VO', V, O],
  ['SiO', SI, O],
  ['MgH', MG, 1],
  ['CaH', CA, 1],
];

/** Rounds of the damped fixed point; it converges in about 60 except in the coolest carbon-rich gas. */
const GREATEST_ROUNDS = 400;
const LEAST_ROUNDS = 20;
const CONVERGED = 1e-5;
/** Keeps logarithms finite, cm^-3. */
const LEAST_DENSITY = 1e-60;

/** Neutral atom densities by element at one point. */
type Atoms = Map<number, number>;

/**
 * One round: each element's neutral density from the conservation of its nuclei, the other densities as they
 * were last found. Linear in the density, or quadratic where two atoms of the element pair up.
 */
function balance(
  atoms: Atoms,
  total: Atoms,
  ionised: Atoms,
  hydrogen: number,
  constants: ReadonlyMap<string, number>,
): void {
  for (const element of ELEMENTS) {
    let linear = ionised.get(element)!;
    let quadratic = 0;
    for (const [molecule, left, right] of MOLECULES) {
      if (left !== element && right !== element) {
        continue;
      }
      const constant = constants.get(molecule)!;
      if (left === right) {
        quadratic += 2 / constant;
      } else {
        const partner = left === element ? right : left;
        linear += (partner === 1 ? hydrogen : atoms.get(partner)!) / constant;
      }
    }
    const nuclei = total.get(element)!;
    const found = (2 * nuclei) / (linear + Math.sqrt(linear * linear + 4 * quadratic * nuclei));
    const old = atoms.get(element)!;
    atoms.set(element, Math.sqrt(Math.max(found, LEAST_DENSITY) * old));
  }
}

/**
 * Chemical equilibrium of C, N, O, Mg, Si, Ca, Ti, V and their diatomic molecules in a gas whose hydrogen and
 * electrons are already known. Damped fixed point (geometric mean of old and new densities) from free atoms.
 */
export function solveChemistry(gas: Gas, composition: Composition, tables: GasTables): Chemistry {
  const molecules = new Map(MOLECULES.map(([name]) => [name, new Float64Array(gas.length)]));
  const freeShare = new Map(ELEMENTS.map((number) => [number, new Float64Array(gas.length)]));
  for (let point = 0; point < gas.length; point += 1) {
    const t = gas.temperature[point]!;
    const hydrogen = gas.neutralHydrogen[point]!;
    const total: Atoms = new Map();
    const ionised: Atoms = new Map();
    const atoms: Atoms = new Map();
    for (const number of ELEMENTS) {
      const element = tables.elements.get(number)!;
      const [neutral] = ionShares(tables.partitions, element, t, gas.electrons[point]!);
      const nuclei = (composition.perHydrogen.get(number) ?? 0) * gas.hydrogenNuclei[point]!;
      total.set(number, nuclei);
      ionised.set(number, 1 / neutral);
      atoms.set(number, Math.max(nuclei * neutral, LEAST_DENSITY));
    }
    const constants = new Map(
      MOLECULES.map(([name]) => [name, dissociationConstant(tables.equilibrium, name, t)]),
    );
    for (let round = 0; round < GREATEST_ROUNDS; round += 1) {
      const before = ELEMENTS.map((number) => atoms.get(number)!);
      balance(atoms, total, ionised, hydrogen, constants);
      const change = Math.max(
        ...ELEMENTS.map((number, i) => Math.abs(Math.log(atoms.get(number)! / before[i]!))),
      );
      if (round > LEAST_ROUNDS && change < CONVERGED) {
        break;
      }
    }
    for (const [name, left, right] of MOLECULES) {
      const partner = right === 1 ? hydrogen : atoms.get(right)!;
      molecules.get(name)![point] = (atoms.get(left)! * partner) / constants.get(name)!;
    }
    for (const number of ELEMENTS) {
      freeShare.get(number)![point] = (atoms.get(number)! * ionised.get(number)!) / total.get(number)!;
    }
  }
  return { molecules, freeShare };
}
