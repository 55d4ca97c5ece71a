import {CONTROLLER_KEYS, DISTURB_FIELDS, type Field, SET_FIELDS} from '../scenario/fields';
import {type LineCommand} from '../scenario/scenario';
import {type Fingerprint} from './hash';
import {type Change} from './schedule';

/** Stands for null among the numbers. */
const NONE = -1.7976931348623157e308;
const COMMANDS = ['run', 'stop', 'fastStop'] as const;
const SET_BY_KEY = new Map(SET_FIELDS.map((field) => [field.path, field]));

/** Mixes a line command into the fingerprint, so that a log moved by one tick shows even when nothing moves. */
export function mixLine(print: Fingerprint, line: LineCommand): void {
  print.mix(1);
  print.mix(COMMANDS.indexOf(line.command));
  print.mix(line.command === 'run' ? line.speedMps : NONE);
  print.mix(line.rampS);
}

/** Mixes a change of settings or of the plant in, keys in the order of their table. */
export function mixChange(print: Fingerprint, change: Change): void {
  if ('set' in change) {
    print.mix(2);
    const values = change.set as Readonly<Record<string, unknown>>;
    CONTROLLER_KEYS.forEach((key, place) => {
      const field = SET_BY_KEY.get(key);
      if (field !== undefined) mixValue(print, place, field, values[key]);
    });
  } else {
    print.mix(3);
    const values = change.disturb as Readonly<Record<string, unknown>>;
    DISTURB_FIELDS.forEach((field, place) => {
      mixValue(print, place, field, values[field.path]);
    });
  }
}

function mixValue(print: Fingerprint, place: number, field: Field, value: unknown): void {
  if (value === undefined) return;
  print.mix(place);
  if (typeof value === 'number') print.mix(value);
  else if (typeof value === 'boolean') print.mix(value ? 1 : 0);
  else if (typeof value === 'string') print.mix(field.choices?.indexOf(value) ?? -1);
  else if (Array.isArray(value)) for (const number of value.flat()) print.mix(number as number);
  else print.mix(NONE);
}
