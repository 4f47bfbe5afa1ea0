import type { FigureDeclaration } from '../kit/calculator.js';

const SMALL = 'R. H. Small, "Direct-Radiator Loudspeaker System Analysis", J. Audio Eng. Soc. 20 (1972) (from memory)';
const THIELE = 'A. N. Thiele, "Loudspeakers in Vented Boxes", Proc. IRE Australia 22 (1961) (from memory)';
const IEC = 'IEC 60268-5:2003 (from memory)';
const COIL = 'of the fitted voice-coil model, without Re and without the motional part';

const row = (
  id: string,
  name: string,
  unit: string,
  definition: string,
  source: string,
  symbol = id,
): FigureDeclaration => ({ id, symbol, name, unit, definition, source });

const resonance: readonly FigureDeclaration[] = [
  row('Re', 'Voice-coil resistance', 'Ω', 'Resistance of the coil at zero frequency.', SMALL),
  row('fs', 'Resonance', 'Hz', '1/(2π√(Mms·Cms)), in the mounting of the free-air sweep; Cms is that at fs.', SMALL),
  row('Qms', 'Mechanical damping', '1', '2π·fs·Mms/Rms. Leaves out the loss of a creeping suspension.', SMALL),
  row('Qes', 'Electrical damping', '1', '2π·fs·Mms·Re/Bl².', SMALL),
  row('Qts', 'Total damping', '1', 'Qms·Qes/(Qms + Qes).', SMALL),
  row(
    'QmsTotal',
    'Mechanical damping with creep',
    '1',
    'Mechanical Q at fs with the loss of a creeping suspension.',
    'common practice, no published source',
    'Qms,total',
  ),
  row('Res', 'Motional resistance', 'Ω', 'Bl²/Rms = Re·Qms/Qes.', SMALL),
  row('fPeak', 'Frequency of the peak', 'Hz', 'Where |Z| of the fitted curve has its motional maximum.', IEC),
  row('Zmax', 'Impedance at the peak', 'Ω', '|Z| of the fitted curve at fPeak.', IEC),
  row(
    'Zmin',
    'Least impedance above the peak',
    'Ω',
    'Smallest |Z| of the fitted curve from fPeak to the end of the sweep.',
    IEC,
  ),
  row('fZmin', 'Frequency of the least impedance', 'Hz', 'Where Zmin lies.', IEC),
  row(
    'ratedZ',
    'Rated impedance allowed',
    'Ω',
    'Largest of 2, 3, 4, 6, 8, 12, 16 Ω of which Zmin is 80 % or more.',
    IEC,
  ),
];
const coil: readonly FigureDeclaration[] = [
  row(
    'Le1k',
    'Inductance at 1 kHz',
    'H',
    `Imaginary part over 2πf at 1 kHz, ${COIL}.`,
    'common practice, no published source',
    'Le(1 kHz)',
  ),
  row(
    'Le10k',
    'Inductance at 10 kHz',
    'H',
    `Imaginary part over 2πf at 10 kHz, ${COIL}.`,
    'common practice, no published source',
    'Le(10 kHz)',
  ),
  row(
    'Rcoil10k',
    'Coil loss at 10 kHz',
    'Ω',
    `Real part at 10 kHz, ${COIL}.`,
    'common practice, no published source',
    'Rcoil(10 kHz)',
  ),
];
const moving: readonly FigureDeclaration[] = [
  row('Mms', 'Moving mass', 'kg', 'Moving mass with its air load, as mounted.', SMALL),
  row(
    'Mmd',
    'Moving mass without air',
    'kg',
    'Mms less the air load of the mounting: (8/3)ρa³ for a bare disc in free air, twice that in a baffle or box.',
    'L. L. Beranek, "Acoustics" (1954) (from memory)',
  ),
  row('Cms', 'Compliance', 'm/N', '1/((2π·fs)²·Mms).', SMALL),
  row('Rms', 'Mechanical resistance', 'N·s/m', '2π·fs·Mms/Qms.', SMALL),
  row('Bl', 'Force factor', 'T·m', '√(2π·fs·Mms·Re/Qes).', SMALL),
  row('Vas', 'Equivalent volume', 'm³', 'Volume of air as compliant as the suspension: ρc²·Sd²·Cms.', THIELE),
  row('Sd', 'Piston area', 'm²', 'π·Dd²/4.', 'AES2-1984 (from memory)'),
  row(
    'Dd',
    'Piston diameter',
    'm',
    'From the middle of the surround on one side to the middle on the other.',
    'AES2-1984 (from memory)',
  ),
  row('fc', 'Resonance in the test box', 'Hz', 'Single resonance of the driver in the known volume.', SMALL),
];
const level: readonly FigureDeclaration[] = [
  row('eta0', 'Efficiency', '1', '(4π²/c³)·fs³·Vas/Qes, into half space.', SMALL, 'η0'),
  row(
    'SPL1W',
    'Level for 1 W',
    'dB',
    '10·lg η0 + 10·lg(ρc/2π) − 20·lg 20 µPa, at 1 m, 1 W into Re.',
    SMALL,
    'SPL(1 W)',
  ),
  row('SPL2V83', 'Level for 2.83 V', 'dB', 'SPL(1 W) + 10·lg(8 Ω/Re), at 1 m.', SMALL, 'SPL(2.83 V)'),
  row('EBP', 'Efficiency-bandwidth product', 'Hz', 'fs/Qes.', 'common practice, no published source'),
];
const LEACH = 'W. M. Leach, J. Audio Eng. Soc. 50 (2002) 442 (from memory)';
const WRIGHT = 'J. R. Wright, J. Audio Eng. Soc. 38 (1990) 749 (from memory)';
const FUTTRUP = 'K. Thorborg, C. Futtrup, J. Audio Eng. Soc. 59 (2011) 612 (from memory)';
const DODD = 'M. Dodd et al., AES 117th Convention (2004) (from memory)';
const parameters: readonly FigureDeclaration[] = [
  row(
    'Le',
    'Coil inductance',
    'H',
    'Inductance of the model inductor; the lossy inductance of the model semi-inductance.',
    `${SMALL}; ${FUTTRUP}`,
  ),
  row('L1', 'Series inductance', 'H', 'jωL1 + (jωL2 ‖ R2).', DODD),
  row('L2', 'Shunted inductance', 'H', 'jωL1 + (jωL2 ‖ R2).', DODD),
  row('R2', 'Eddy resistance', 'Ω', 'jωL1 + (jωL2 ‖ R2).', DODD),
  row(
    'K',
    'Coil factor',
    'Ω·s^n',
    'Factor of K(jω)^n, or of K√(jω) in the model semi-inductance.',
    `${LEACH}; ${FUTTRUP}`,
  ),
  row('n', 'Coil exponent', '1', 'Exponent of K(jω)^n.', LEACH),
  row('Kr', 'Resistive factor', 'Ω·s^Xr', 'Kr·ω^Xr + j·Ki·ω^Xi.', WRIGHT),
  row('Xr', 'Resistive exponent', '1', 'Kr·ω^Xr + j·Ki·ω^Xi.', WRIGHT),
  row('Ki', 'Reactive factor', 'Ω·s^Xi', 'Kr·ω^Xr + j·Ki·ω^Xi.', WRIGHT),
  row('Xi', 'Reactive exponent', '1', 'Kr·ω^Xr + j·Ki·ω^Xi.', WRIGHT),
  row('Leb', 'Leakage inductance', 'H', 'jωLeb + (jωLe ‖ K√(jω) ‖ Rss).', FUTTRUP),
  row('Rss', 'Shunt resistance', 'Ω', 'jωLeb + (jωLe ‖ K√(jω) ‖ Rss).', FUTTRUP),
  row(
    'lambda',
    'Creep',
    '1',
    'Cms·(1 − λ·lg(jf/fs)).',
    'M. H. Knudsen, J. G. Jensen, J. Audio Eng. Soc. 41 (1993) 3 (from memory)',
    'λ',
  ),
  row('kappa', 'Relaxing share', '1', 'Cms·(1 + κ/(1 + jωτ)).', 'standard linear solid (from memory)', 'κ'),
  row('tau', 'Relaxation time', 's', 'Cms·(1 + κ/(1 + jωτ)).', 'standard linear solid (from memory)', 'τ'),
];
const quality: readonly FigureDeclaration[] = [
  row(
    'rmsResidual',
    'Misfit',
    '1',
    'Root mean square of |ln(Z/model)| over the fitted points.',
    'common practice, no published source',
  ),
];

/** What a builder looks for first. */
const MAIN = new Set(['Re', 'fs', 'Qms', 'Qes', 'Qts', 'Le1k', 'Vas', 'Mms', 'Cms', 'Bl', 'Sd', 'SPL2V83', 'ratedZ']);

/** Every figure that driver-fit can return, in the order of its tables. */
export const figureList: readonly FigureDeclaration[] = [
  ...resonance,
  ...coil,
  ...moving,
  ...level,
  ...parameters,
  ...quality,
].map((figure) => (MAIN.has(figure.id) ? { ...figure, isMain: true } : figure));
