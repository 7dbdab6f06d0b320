/**
 * The bibliography, and the only door through which a measured number enters the science.
 *
 * `constant` takes a reference key that must exist here, so a coefficient without an origin does
 * not compile. Files unwrap `.value` once, when the module loads: arithmetic sees plain numbers.
 */

export type Provenance = 'published' | 'handbook' | 'worked-example' | 'common-practice' | 'from-memory';

export type Reference = {
  readonly citation: string;
  readonly provenance: Provenance;
  /** How sure we are of numbers recalled rather than read again; only with `from-memory`. */
  readonly confidence?: 'high' | 'medium' | 'low';
  /** What a reader must know before relying on it. */
  readonly note?: string;
};

const bibliography = {
  // Constants of nature and of measurement
  'codata-2022': {
    citation: 'CODATA recommended values of the fundamental physical constants: 2022.',
    provenance: 'published',
    note: 'e, k and N_A are exact since 2019; the vacuum permittivity is measured (1.6e-10).',
  },
  'iupac-atomic-weights': {
    citation:
      'IUPAC Commission on Isotopic Abundances and Atomic Weights, standard atomic weights (K 39.0983, Cl 35.453).',
    provenance: 'published',
    note: 'Cl varies 35.446 to 35.457 with origin: 0.007 % of the molar mass of KCl.',
  },
  'its-90': {
    citation: 'H. Preston-Thomas, The International Temperature Scale of 1990, Metrologia 27 (1990) 3.',
    provenance: 'published',
  },
  'international-ohm-1948': {
    citation:
      'Change from the mean international ohm to the absolute ohm, 1948; factor for conductivity as used in USGS Water-Supply Paper 2311, table 1.',
    provenance: 'published',
  },

  // Water
  'iapws-sr6-08': {
    citation: 'IAPWS SR6-08(2011), Revised Supplementary Release on Properties of Liquid Water at 0.1 MPa.',
    provenance: 'published',
  },
  'iapws-r8-97': {
    citation: 'IAPWS R8-97, Release on the Static Dielectric Constant of Ordinary Water Substance.',
    provenance: 'published',
  },
  'iapws-r12-08': {
    citation:
      'IAPWS R12-08, Release on the IAPWS Formulation 2008 for the Viscosity of Ordinary Water Substance.',
    provenance: 'published',
  },
  'iapws-conductivity-1990': {
    citation:
      'IAPWS, Electrolytic Conductivity (Specific Conductance) of Liquid and Dense Supercritical Water, 0 to 800 degC, 1990; after W. L. Marshall, J. Chem. Eng. Data 32 (1987) 221.',
    provenance: 'published',
  },
  'light-2005': {
    citation:
      'T. S. Light, S. Licht, A. C. Bevilacqua, K. R. Morash, Electrochem. Solid-State Lett. 8 (2005) E16.',
    provenance: 'from-memory',
    confidence: 'high',
    note: 'High for 25 degC (0.05501 uS/cm, 18.18 Mohm cm); medium elsewhere.',
  },
  'tanaka-2001': {
    citation: 'M. Tanaka, G. Girard, R. Davis, A. Peuto, N. Bignell, Metrologia 38 (2001) 301.',
    provenance: 'published',
  },
  'kell-1975': { citation: 'G. S. Kell, J. Chem. Eng. Data 20 (1975) 97.', provenance: 'published' },

  // KCl reference solutions
  'pratt-2001': {
    citation:
      'K. W. Pratt, W. F. Koch, Y. C. Wu, P. A. Berezansky, Pure Appl. Chem. 73 (2001) 1783, as reprinted in the CRC Handbook of Chemistry and Physics, p. 5-73.',
    provenance: 'published',
    note: 'ITS-90, absolute ohm, conductivity of the water subtracted. Stated uncertainty about 0.03 % (0.01 mol/kg) and 0.04 % (0.1 and 1 mol/kg), coverage not stated in the reprint.',
  },
  'jones-bradshaw-1933': {
    citation: 'G. Jones, B. C. Bradshaw, J. Am. Chem. Soc. 55 (1933) 1780.',
    provenance: 'from-memory',
    confidence: 'high',
    note: 'International ohm. 1408.77 and its absolute form 1408.07 at 25 degC are confirmed by USGS WSP 2311.',
  },
  'oiml-r56': {
    citation:
      'OIML R 56 (1981), Standard solutions reproducing the conductivity of electrolytes, tables 1 and 2.',
    provenance: 'published',
    note: 'Read second-hand at 25 degC; the values at 0 and 18 degC are from memory, confidence medium.',
  },
  'usgs-wsp-2311': {
    citation:
      'R. L. Miller, W. L. Bradford, N. E. Peters, Specific Conductance, USGS Water-Supply Paper 2311 (1988), tables 1 and 5.',
    provenance: 'published',
  },
  'kohlrausch-holborn': {
    citation:
      'Conductivity of normal KCl solutions, Kohlrausch-Holborn lineage, reprinted in many handbooks.',
    provenance: 'from-memory',
    confidence: 'high',
    note: 'Three to four digits: good to 0.15 %.',
  },
  'astm-d1125': {
    citation:
      'ASTM D1125, Standard Test Methods for Electrical Conductivity and Resistivity of Water, reference solutions.',
    provenance: 'from-memory',
    confidence: 'medium',
    note: 'Numbers high, edition medium. International ohm.',
  },
  'iso-7888': {
    citation: 'ISO 7888:1985 (EN 27888:1993), Water quality - Determination of electrical conductivity.',
    provenance: 'published',
    note: 'The natural-water equation is published; its KCl table is from memory, confidence medium.',
  },
  'apha-2510': {
    citation: 'Standard Methods for the Examination of Water and Wastewater, 2510 Conductivity.',
    provenance: 'from-memory',
    confidence: 'high',
  },
  'laliberte-2009': { citation: 'M. Laliberte, J. Chem. Eng. Data 54 (2009) 1725.', provenance: 'published' },
  'kcl-solid-density': {
    citation: 'Density of crystalline KCl, 1984 kg/m3, handbook value.',
    provenance: 'from-memory',
    confidence: 'high',
  },

  // Conductance of electrolytes
  'onsager-1927': { citation: 'L. Onsager, Physik. Z. 28 (1927) 277.', provenance: 'published' },
  'robinson-stokes': {
    citation: 'R. A. Robinson, R. H. Stokes, Electrolyte Solutions, 2nd ed. (1959), ch. 7 and app. 6.',
    provenance: 'from-memory',
    confidence: 'high',
  },
  'harned-owen': {
    citation:
      'H. S. Harned, B. B. Owen, The Physical Chemistry of Electrolytic Solutions, 3rd ed. (1958), limiting conductances 5 to 55 degC.',
    provenance: 'from-memory',
    confidence: 'high',
    note: 'The cubics agree with the KCl values of Robinson and Stokes within 0.033 %.',
  },
  'crc-equivalent-conductivity': {
    citation:
      'CRC Handbook of Chemistry and Physics, Equivalent conductivity of electrolytes in aqueous solution (25 degC, absolute ohm), after Shedlovsky, MacInnes and Harned-Owen.',
    provenance: 'from-memory',
    confidence: 'high',
  },
  'crc-ionic-conductivity': {
    citation:
      'CRC Handbook of Chemistry and Physics, Ionic conductivity and diffusion at infinite dilution (25 degC).',
    provenance: 'handbook',
  },
  'lange-8-32': {
    citation: "Lange's Handbook of Chemistry, table 8.32, limiting equivalent ionic conductances.",
    provenance: 'handbook',
  },
  'shedlovsky-1932': {
    citation: 'T. Shedlovsky, J. Am. Chem. Soc. 54 (1932) 1411, KCl, NaCl and HCl at 25 degC.',
    provenance: 'published',
    note: 'International ohm, as reprinted in textbooks.',
  },
  'lind-zwolenik-fuoss-1959': {
    citation: 'J. E. Lind, J. J. Zwolenik, R. M. Fuoss, J. Am. Chem. Soc. 81 (1959) 1557.',
    provenance: 'from-memory',
    confidence: 'high',
    note: 'International ohm: it reproduces the old-ohm Shedlovsky table within 0.0045 %.',
  },
  'juhasz-marsh-1981': {
    citation:
      'E. Juhasz, K. N. Marsh, Pure Appl. Chem. 53 (1981) 1841; also J. Barthel, F. Feuerlein, R. Neueder, R. Wachter, J. Solution Chem. 9 (1980) 209.',
    provenance: 'from-memory',
    confidence: 'high',
    note: 'High for the coefficients, medium for which of the two prints them in this form. Absolute ohm.',
  },
  'chambers-1956': {
    citation:
      'J. F. Chambers, J. M. Stokes, R. H. Stokes, J. Phys. Chem. 60 (1956) 985, concentrated KCl at 25 degC.',
    provenance: 'from-memory',
    confidence: 'medium',
  },
  'mccleskey-2011': {
    citation: 'R. B. McCleskey, J. Chem. Eng. Data 56 (2011) 317.',
    provenance: 'published',
  },
  'glasstone-solvents': {
    citation:
      'Onsager slopes in non-aqueous solvents at 25 degC, physical chemistry textbook tables (Glasstone; Maron).',
    provenance: 'from-memory',
    confidence: 'high',
    note: 'The A of acetone and acetonitrile as recalled is ten times too small.',
  },
  'onsager-worked-example': {
    citation:
      'Textbook worked example, NaCl 0.005 equiv/L at 25 degC by the limiting law (60.20, 0.229, 126.45).',
    provenance: 'worked-example',
  },
  'debye-falkenhagen-1928': {
    citation:
      'P. Debye, H. Falkenhagen, Physik. Z. 29 (1928) 121 and 401; H. Falkenhagen, Electrolytes (1934).',
    provenance: 'from-memory',
    confidence: 'medium',
  },

  // Practice
  'usp-645': {
    citation: 'USP <645> Water Conductivity, stage 1 table.',
    provenance: 'from-memory',
    confidence: 'high',
    note: 'The table is from memory; the stage 2 limit and the instrument requirements were read in USP 32.',
  },
  'weighing-practice': {
    citation:
      'Conventional value of the result of weighing in air (OIML D 28): weights of 8000 kg/m3, air 1.2 kg/m3.',
    provenance: 'common-practice',
  },
  'bench-practice': {
    citation: 'Common practice of conductivity work.',
    provenance: 'common-practice',
    note: 'Numbers that people of the trade use and that no single document fixes.',
  },

  // Uncertainty, decision, statistics
  'gum-2008': {
    citation:
      'JCGM 100:2008, Evaluation of measurement data - Guide to the expression of uncertainty in measurement.',
    provenance: 'published',
  },
  'jcgm-106': {
    citation: 'JCGM 106:2012, The role of measurement uncertainty in conformity assessment.',
    provenance: 'published',
  },
  'ilac-g8': {
    citation: 'ILAC-G8:09/2019, Guidelines on decision rules and statements of conformity.',
    provenance: 'published',
  },
  'ilac-g24': {
    citation:
      'ILAC-G24 / OIML D 10, Guidelines for the determination of recalibration intervals of measuring equipment (2007, revised 2022).',
    provenance: 'published',
  },
  'nist-ewma': {
    citation: 'NIST/SEMATECH e-Handbook of Statistical Methods, 6.3.2.4 EWMA control charts.',
    provenance: 'worked-example',
  },
  'nist-cusum': {
    citation: 'NIST/SEMATECH e-Handbook of Statistical Methods, 6.3.2.3 CUSUM control charts.',
    provenance: 'worked-example',
  },
  'nist-handbook': {
    citation: 'NIST/SEMATECH e-Handbook of Statistical Methods, sections 1.3.6, 4.5 and 6.3.',
    provenance: 'handbook',
  },
  'abramowitz-stegun': {
    citation: 'M. Abramowitz, I. A. Stegun, Handbook of Mathematical Functions (1964), ch. 26.',
    provenance: 'handbook',
  },
  bevington: {
    citation:
      'P. R. Bevington, D. K. Robinson, Data Reduction and Error Analysis for the Physical Sciences, 3rd ed. (2003), ch. 4 and 6.',
    provenance: 'handbook',
  },
  'birge-1932': {
    citation:
      'R. T. Birge, The calculation of errors by the method of least squares, Phys. Rev. 40 (1932) 207.',
    provenance: 'published',
  },
  'dersimonian-laird-1986': {
    citation:
      'R. DerSimonian, N. Laird, Meta-analysis in clinical trials, Control. Clin. Trials 7 (1986) 177.',
    provenance: 'published',
  },
  'iso-13528': {
    citation:
      'ISO 13528:2022, Statistical methods for use in proficiency testing by interlaboratory comparison, E_n score.',
    provenance: 'published',
  },
  'usgs-tm1-d3': {
    citation:
      'R. J. Wagner, R. W. Boulger, C. J. Oblinger, B. A. Smith, Guidelines and Standard Procedures for Continuous Water-Quality Monitors, USGS Techniques and Methods 1-D3 (2006).',
    provenance: 'from-memory',
    confidence: 'high',
    note: 'Fouling is the change on cleaning, corrected for the change of the water meanwhile; drift is what remains in the reference solution.',
  },
  qartod: {
    citation:
      'IOOS QARTOD, Manual for Real-Time Quality Control of In-Situ Temperature and Salinity Data: gap, gross range, spike, rate of change, flat line and neighbour tests.',
    provenance: 'published',
    note: 'The tests are published; the default limits used here are common practice.',
  },
  'nist-strd-norris': {
    citation: 'NIST Statistical Reference Datasets, Norris (linear regression).',
    provenance: 'published',
  },
} as const satisfies Record<string, Reference>;

export type ReferenceKey = keyof typeof bibliography;

/** Every source the science relies on, by key. */
export const references: Readonly<Record<ReferenceKey, Reference>> = bibliography;

export type Sourced<T> = {
  readonly value: T;
  readonly unit: string;
  readonly source: ReferenceKey;
  /** Standard uncertainty in the same unit, where the source states one. */
  readonly standardUncertainty: number | null;
};

/** A number, a list or a table of numbers with its unit and the source it came from. */
export function constant<const T>(
  value: T,
  unit: string,
  source: ReferenceKey,
  standardUncertainty: number | null = null,
): Sourced<T> {
  return { value, unit, source, standardUncertainty };
}

/** The citation of a source as one line of text, with its provenance. */
export function citation(key: ReferenceKey): string {
  const { citation: text, provenance, confidence } = references[key];
  if (provenance !== 'from-memory') return `${text} (${provenance})`;
  return `${text} (from memory${confidence === undefined ? '' : `, confidence ${confidence}`})`;
}
