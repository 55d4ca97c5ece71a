/** The two families of units a person can choose; stored values are SI. */
export type UnitSystem = 'si' | 'us';

interface UnitOf {
  readonly unit: string;
  /** SI value = shown value × factor + offset. */
  readonly factor: number;
  readonly offset?: number;
  /** Digits after the point. */
  readonly digits: number;
}

// Exact factors: NIST Special Publication 811 (2008), appendix B: 1 in = 0.0254 m, 1 ft = 0.3048 m,
// 1 lb = 0.45359237 kg, standard gravity 9.80665 m/s² (from memory; the four are exact by definition).
const INCH_M = 0.0254;
const FOOT_M = 0.3048;
const POUND_KG = 0.45359237;
const POUND_FORCE_N = POUND_KG * 9.80665;
/** lb per 3000 ft² [kg/m²]. */
const REAM_KG_M2 = POUND_KG / (3000 * FOOT_M * FOOT_M);

/** Every quantity that people read or type, in both families. */
export const QUANTITIES = {
  basisWeight: [
    {unit: 'g/m²', factor: 0.001, digits: 1},
    {unit: 'lb/3000 ft²', factor: REAM_KG_M2, digits: 1},
  ],
  diameter: [
    {unit: 'mm', factor: 0.001, digits: 0},
    {unit: 'in', factor: INCH_M, digits: 2},
  ],
  factor: [
    {unit: '×', factor: 1, digits: 2},
    {unit: '×', factor: 1, digits: 2},
  ],
  gain: [
    {unit: '% per %', factor: 1, digits: 3},
    {unit: '% per %', factor: 1, digits: 3},
  ],
  length: [
    {unit: 'm', factor: 1, digits: 1},
    {unit: 'ft', factor: FOOT_M, digits: 1},
  ],
  loop: [
    {unit: 'mm', factor: 0.001, digits: 0},
    {unit: 'in', factor: INCH_M, digits: 1},
  ],
  mass: [
    {unit: 'kg', factor: 1, digits: 1},
    {unit: 'lb', factor: POUND_KG, digits: 1},
  ],
  percent: [
    {unit: '%', factor: 1, digits: 1},
    {unit: '%', factor: 1, digits: 1},
  ],
  power: [
    {unit: 'W', factor: 1, digits: 0},
    {unit: 'W', factor: 1, digits: 0},
  ],
  share: [
    {unit: '%', factor: 0.01, digits: 0},
    {unit: '%', factor: 0.01, digits: 0},
  ],
  speed: [
    {unit: 'm/min', factor: 1 / 60, digits: 0},
    {unit: 'ft/min', factor: FOOT_M / 60, digits: 0},
  ],
  temperature: [
    {unit: '°C', factor: 1, digits: 0},
    {unit: '°F', factor: 5 / 9, offset: -160 / 9, digits: 0},
  ],
  tension: [
    {unit: 'N', factor: 1, digits: 0},
    {unit: 'lbf', factor: POUND_FORCE_N, digits: 1},
  ],
  tensionPerWidth: [
    {unit: 'N/m', factor: 1, digits: 0},
    {unit: 'lbf/in', factor: POUND_FORCE_N / INCH_M, digits: 2},
  ],
  thickness: [
    {unit: 'µm', factor: 1e-6, digits: 0},
    {unit: 'mil', factor: INCH_M / 1000, digits: 2},
  ],
  time: [
    {unit: 's', factor: 1, digits: 2},
    {unit: 's', factor: 1, digits: 2},
  ],
  torque: [
    {unit: 'N·m', factor: 1, digits: 1},
    {unit: 'lbf·ft', factor: POUND_FORCE_N * FOOT_M, digits: 1},
  ],
} as const satisfies Record<string, readonly [UnitOf, UnitOf]>;
export type Quantity = keyof typeof QUANTITIES;

function unitOf(quantity: Quantity, system: UnitSystem): UnitOf {
  return QUANTITIES[quantity][system === 'si' ? 0 : 1];
}

/** Unit as written beside a number. */
export function unitName(quantity: Quantity, system: UnitSystem): string {
  return unitOf(quantity, system).unit;
}

/** An SI value as the person reads it. Speed [m/s] becomes m/min or ft/min; a diameter [m] mm or in. */
export function toPerson(quantity: Quantity, si: number, system: UnitSystem): number {
  const {factor, offset = 0} = unitOf(quantity, system);
  return (si - offset) / factor;
}

/** What the person typed, as SI. */
export function fromPerson(quantity: Quantity, shown: number, system: UnitSystem): number {
  const {factor, offset = 0} = unitOf(quantity, system);
  return shown * factor + offset;
}

/** Number and unit ready to be shown; a dash for what is not a number. */
export function formatted(
  quantity: Quantity,
  si: number,
  system: UnitSystem,
): {number: string; unit: string} {
  const {unit, digits} = unitOf(quantity, system);
  const shown = toPerson(quantity, si, system);
  if (!Number.isFinite(shown)) return {number: '–', unit};
  const text =
    quantity === 'gain' || quantity === 'time' ? threeDigits(shown, digits) : shown.toFixed(digits);
  return {number: text.replace(/^-(?=0(\.0*)?$)/, ''), unit};
}

/** "264 N": number and unit in one text. */
export function written(quantity: Quantity, si: number, system: UnitSystem): string {
  const {number, unit} = formatted(quantity, si, system);
  return `${number} ${unit}`;
}

/** A number as people type it, with comma or point; null when it is none. */
export function parseNumber(text: string): number | null {
  const plain = text.trim().replace(',', '.').replace('−', '-');
  return /^-?(\d+\.?\d*|\.\d+)$/.test(plain) ? Number(plain) : null;
}

/** Three digits that mean something, as settings that step by a factor are read; 2, 0.15, 0.074. */
function threeDigits(value: number, most: number): string {
  const size = Math.abs(value);
  if (size === 0) return '0';
  const digits = size >= 100 ? 0 : size >= 10 ? 1 : size >= 1 ? 2 : 3;
  return String(Number(value.toFixed(Math.max(digits, size < 1 ? most : 0))));
}
