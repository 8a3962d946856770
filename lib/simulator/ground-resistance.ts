import type { LocalPlane } from "@/lib/geo/local-plane";
import { createSeededRandom } from "@/lib/simulator/seeded-random";
import type { ResidueBands, SimulationOptions, SoilTrend } from "@/lib/simulator/simulation-options";

/** What the ground asks of an opener at a place, apart from anything about the machine. */
export interface Ground {
  /** Soil alone, without bands. */
  soilN(eastM: number, northM: number): number;
  isInBand(eastM: number, northM: number): boolean;
}

export function createGround(options: SimulationOptions, plane: LocalPlane): Ground {
  const surface = createSmoothSurface(options.soil, options.soil.seed ?? options.seed);
  const { gradientEastNPerM, gradientNorthNPerM } = options.soil;
  return {
    soilN: (eastM, northM) =>
      options.baseResistanceN + gradientEastNPerM * eastM + gradientNorthNPerM * northM + surface(eastM, northM),
    isInBand: createBandTest(options.bands, plane),
  };
}

/** True inside a band. Edges are sharp, so contrast and width mean exactly what they say. */
export function createBandTest(
  bands: ResidueBands | null,
  plane: LocalPlane,
): (eastM: number, northM: number) => boolean {
  if (!bands) return () => false;
  const headingRad = (bands.headingDeg * Math.PI) / 180;
  const cos = Math.cos(headingRad);
  const sin = Math.sin(headingRad);
  const [throughEastM, throughNorthM] = plane.toPlane(...bands.through);
  const centreM = throughEastM * cos - throughNorthM * sin + bands.sideShiftM;
  return (eastM, northM) => {
    const acrossM = eastM * cos - northM * sin - centreM;
    const fromCentreM = acrossM - bands.periodM * Math.round(acrossM / bands.periodM);
    return Math.abs(fromCentreM) < bands.widthM / 2;
  };
}

/** Waves summed for the smooth surface: enough that no single one shows, few enough to stay cheap. */
const WAVES = 24;

/**
 * A smooth random surface with standard deviation `noiseN` and correlation exp(-d^2 / (2 range^2)): random Fourier
 * features (Rahimi & Recht 2007), so any place can be asked for without a grid.
 */
function createSmoothSurface(soil: SoilTrend, seed: number): (eastM: number, northM: number) => number {
  if (soil.noiseN === 0) return () => 0;
  const random = createSeededRandom(seed, "soil");
  const waveEast = new Float64Array(WAVES);
  const waveNorth = new Float64Array(WAVES);
  const phase = new Float64Array(WAVES);
  for (let wave = 0; wave < WAVES; wave += 1) {
    waveEast[wave] = random.normal() / soil.noiseRangeM;
    waveNorth[wave] = random.normal() / soil.noiseRangeM;
    phase[wave] = 2 * Math.PI * random.uniform();
  }
  const amplitude = soil.noiseN * Math.sqrt(2 / WAVES);
  return (eastM, northM) => {
    let sum = 0;
    for (let wave = 0; wave < WAVES; wave += 1) {
      sum += Math.cos((waveEast[wave] ?? 0) * eastM + (waveNorth[wave] ?? 0) * northM + (phase[wave] ?? 0));
    }
    return amplitude * sum;
  };
}
