import type { Chance } from './chance';

/** A heated plate under a cooler in a room: two lumped masses. Invented values of a plausible size. */
export interface RunSettings {
  /** W */
  readonly watts: number;
  /** K/W, plate to cooler: paste and spreading; what a mount changes. */
  readonly contact: number;
  /** K/W, cooler to air. */
  readonly toAir: number;
  /** J/K of the heated plate and of the cooler. */
  readonly plateCapacity: number;
  readonly coolerCapacity: number;
  /** °C of the room at the start, and °C per hour it drifts. */
  readonly room: number;
  readonly roomDrift: number;
  /** °C above the room at which the run starts: the run before has not quite cooled down. */
  readonly headStart: number;
  readonly fanSpeed: number;
  /** s */
  readonly duration: number;
  readonly step: number;
  /** Standard deviation of the plate sensor's noise and the step of both sensors, °C. */
  readonly sensorNoise: number;
  readonly sensorStep: number;
}

/** Simulated readings, already rounded as the sensors give them. */
export interface Readings {
  readonly seconds: readonly number[];
  readonly plate: readonly number[];
  readonly ambient: readonly number[];
  readonly watts: readonly number[];
  readonly fan: readonly number[];
}

const toStep = (value: number, step: number): number => Math.round(value / step) * step;

/** Runs the model second by second: first-order warm-up, slow wander of room, air flow and heater, noise of each sensor. */
export function simulate(settings: RunSettings, chance: Chance): Readings {
  const readings = {
    seconds: [] as number[],
    plate: [] as number[],
    ambient: [] as number[],
    watts: [] as number[],
    fan: [] as number[],
  };
  let plate = settings.room + settings.headStart;
  let cooler = settings.room + settings.headStart * 0.9;
  let roomWander = 0;
  let wattsWander = 0;
  let flowWander = 0;
  for (let second = 0; second <= settings.duration; second += 1) {
    // First-order wanders: each forgets with its own time constant (s) and keeps its standard deviation.
    roomWander += -roomWander / 400 + 0.06 * Math.sqrt(2 / 400) * chance.normal();
    wattsWander += -wattsWander / 60 + 0.15 * Math.sqrt(2 / 60) * chance.normal();
    flowWander += -flowWander / 25 + 0.0035 * Math.sqrt(2 / 25) * chance.normal();
    const room = settings.room + (settings.roomDrift * second) / 3600 + roomWander;
    const watts = settings.watts + wattsWander;
    const toAir = settings.toAir * (1 + flowWander);
    if (second % settings.step === 0) {
      readings.seconds.push(second);
      readings.plate.push(toStep(plate + settings.sensorNoise * chance.normal(), settings.sensorStep));
      readings.ambient.push(toStep(room + 0.06 * chance.normal(), settings.sensorStep));
      readings.watts.push(toStep(watts + 0.1 * chance.normal(), 0.1));
      readings.fan.push(toStep(settings.fanSpeed * (1 + 0.004 * chance.normal()), 1));
    }
    const intoCooler = (plate - cooler) / settings.contact;
    plate += (watts - intoCooler) / settings.plateCapacity;
    cooler += (intoCooler - (cooler - room) / toAir) / settings.coolerCapacity;
  }
  return readings;
}
