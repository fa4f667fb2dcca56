/** What a reader must know to judge the numbers: methods with their published sources, and their limits. */
export interface MethodNote {
  readonly title: string
  readonly text: string
  readonly sources: readonly string[]
}

export const methodNotes: readonly MethodNote[] = [
  {
    title: 'Balances',
    text: 'Mass and energy balances of every unit in steady flow, solved simultaneously; kinetic and potential energy are neglected unless a quantity names them. Closure is worked out anew from the streams alone, relative to the largest flow and to the heat input.',
    sources: [],
  },
  {
    title: 'Steam and water',
    text: 'All states by the industrial formulation, by its forward equations; 273.15 K to 1073.15 K up to 100 MPa, up to 2273.15 K to 50 MPa. At the borders of its regions the formulation itself jumps in enthalpy by up to some 0.1 kJ/kg.',
    sources: [
      'IAPWS R7-97(2012), Revised Release on the IAPWS Industrial Formulation 1997 for the Thermodynamic Properties of Water and Steam.',
    ],
  },
  {
    title: 'Turbines',
    text: 'Each stage group expands from its own inlet state with its own dry isentropic efficiency, less its wetness loss on the wet part of the drop. Flow and pressures of a group of fixed hardware follow the ellipse law; it holds for groups of many stages, not for single or control stages. Dry efficiencies are kept off design unless a curve is given.',
    sources: [
      'A. Stodola, Steam and Gas Turbines (the ellipse law); D. H. Cooke, On prediction of off-design multistage turbine pressures by Stodola’s ellipse, J. Eng. Gas Turbines Power 107 (1985) 596.',
      'K. Baumann, Some recent developments in large steam turbine practice, J. IEE 59 (1921).',
    ],
  },
  {
    title: 'Heaters and condensers',
    text: 'Zones of drain cooling, condensing and desuperheating in counterflow, each with its conductance and logarithmic mean difference; in the condensing zone the shell is at saturation throughout. Terminal difference: shell saturation less water outlet; drain approach: drain outlet less water inlet. Heat lost to the surroundings is neglected.',
    sources: [
      'Terms as in ASME PTC 12.1, Closed Feedwater Heaters, and HEI Standards for Closed Feedwater Heaters.',
    ],
  },
  {
    title: 'Efficiencies and heat rates',
    text: 'Each total names what it is divided by. Fuel heat and all that follows from it count by the heating value (LHV or HHV) on which the boiler efficiency is stated; figures of different bases must not be compared.',
    sources: [],
  },
  {
    title: 'Exergy',
    text: 'Physical exergy of the streams above the stated ambient state; the exergy of the fuel is taken equal to its heat. Heat given off by condensers and lines counts as lost at the ambient temperature.',
    sources: [],
  },
]

export const cautions: readonly string[] = [
  'Results are for sketching and checking. They are no design of pressure equipment, no guarantee and no substitute for a test.',
  'Pressure equipment and changes to a plant need the applicable codes and local rules, the makers’ data and a licensed engineer.',
  'Usual values and ranges are common practice of the trade unless a source is named; the makers’ data take their place.',
  'All pressures are absolute unless they are marked otherwise.',
]
