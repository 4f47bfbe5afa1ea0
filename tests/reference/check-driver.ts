import { type Complex, complex, type DriverParts, parallel, plus, times } from './simulated-driver.js';

/**
 * A synthetic check driver, exact by construction with ρ = 1.2 kg/m³ and c = 343 m/s: Re 6 Ω, fs 30 Hz, Qms 4,
 * Qes 0.4, Vas 0.060 m³, Sd 0.0220 m². Everything else follows from the small-signal relations of
 * R. H. Small, J. Audio Eng. Soc. 20 (1972) (from memory).
 */
const [re, fs, qms, qes, vas, sd] = [6, 30, 4, 0.4, 0.06, 0.022];
export const CHECK_AIR = { density: 1.2, speedOfSound: 343 } as const;
export const CHECK_STIFFNESS_OF_AIR = CHECK_AIR.density * CHECK_AIR.speedOfSound ** 2;
const omega = 2 * Math.PI * fs;
const cms = vas / (CHECK_STIFFNESS_OF_AIR * sd * sd);
const mms = 1 / (omega * omega * cms);
export const CHECK_FIGURES = { Re: re, fs, Qms: qms, Qes: qes, Qts: 1 / (1 / qms + 1 / qes), Vas: vas } as const;

const power = (w: number, exponent: number, phase: number): Complex =>
  complex(w ** exponent * Math.cos(phase), w ** exponent * Math.sin(phase));

/** The five voice coils, with values usual for a woofer of this size. */
export const CHECK_COILS = {
  inductor: (w: number) => complex(0, w * 0.8e-3),
  'inductor+eddy': (w: number) => plus(complex(0, w * 0.5e-3), parallel(complex(0, w * 1e-3), complex(5))),
  'power-law': (w: number) => times(complex(6.89e-3), power(w, 0.7, (0.7 * Math.PI) / 2)),
  'split-power-law': (w: number) => complex(0.0022 * w ** 0.75, 0.0048 * w ** 0.76),
  'semi-inductance': (w: number) =>
    plus(complex(0, w * 0.2e-3), parallel(complex(0, w * 2e-3), times(complex(0.06), power(w, 0.5, Math.PI / 4)))),
} as const satisfies Record<string, (omega: number) => Complex>;
export type CheckCoil = keyof typeof CHECK_COILS;

export function checkDriver(coil: CheckCoil): DriverParts {
  return {
    re,
    bl: Math.sqrt((omega * mms * re) / qes),
    mms,
    cms,
    rms: (omega * mms) / qms,
    sd,
    coil: CHECK_COILS[coil],
  };
}
