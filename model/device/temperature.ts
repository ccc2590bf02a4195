/**
 * A device at another temperature than the one its values were read at.
 *
 * Law      |VGS(off)| rises by 2.2 mV/°C; mobility, and β or G0 with it, falls as T^−2.087, which is −0.7 %/°C at 25 °C;
 *          reverse current and leakage double every 10 °C
 * Valid    −55 … 150 °C; the last figure is a textbook bound (8 … 12 °C), not a curve of a part
 * Source   textbook values, from memory; they put the zero-drift overdrive at 0.63 V in saturation and 0.31 V in the ohmic region
 */
import type { Device } from '../design/types.ts';
import { power } from './math.ts';

const GATE_OFF_V_PER_C = 2.2e-3;
const MOBILITY_EXPONENT = 2.087;
const LEAKAGE_DOUBLES_C = 10;
export const ZERO_CELSIUS_K = 273.15;
/** k/q: Boltzmann's constant over the elementary charge, both exact in the SI of 2019, V/K. */
const VOLT_PER_KELVIN = 1.380649e-23 / 1.602176634e-19;

/** kT/q, V. */
export function thermalVoltage(tempC: number): number {
  return VOLT_PER_KELVIN * (tempC + ZERO_CELSIUS_K);
}

/** What changes with temperature: the device's values at `tempC`, and the factor on β or G0 that they do not express. */
export function atTemperature(device: Device, tempC: number): { device: Device; mobilityFactor: number } {
  const risenC = tempC - device.readAtC;
  if (risenC === 0) return { device, mobilityFactor: 1 };
  const sign = device.gateOffV < 0 ? -1 : 1;
  const leakage = power(2, risenC / LEAKAGE_DOUBLES_C);
  const { reverseA, leakageS } = device.junction;
  return {
    device: {
      ...device,
      gateOffV: device.gateOffV + sign * GATE_OFF_V_PER_C * risenC,
      junction: { ...device.junction, reverseA: reverseA * leakage, leakageS: leakageS * leakage },
    },
    mobilityFactor: power((tempC + ZERO_CELSIUS_K) / (device.readAtC + ZERO_CELSIUS_K), -MOBILITY_EXPONENT),
  };
}
