import {type Field, LINE_FIELDS, SET_FIELDS} from '#sim-core/index';
import {type Touch} from '#shared/exercises/exercise';
import {type Problem} from '#shared/problem';

type Fault = Problem['errors'][number];

/** What is wrong in what a trainee may touch: keys that cannot be set live, ranges beyond the engine's. */
export function touchFaults({settings, commands}: Touch): Fault[] {
  const keys = settings.map(({key}) => key);
  return [
    ...settings.flatMap((setting, index) => {
      const at = `touch.settings.${index}`;
      const field = SET_FIELDS.find(({path}) => path === setting.key);
      if (!field)
        return [fault(`${at}.key`, setting.key, 'No setting that can be changed while running.')];
      if (keys.indexOf(setting.key) < index) return [fault(`${at}.key`, setting.key, 'Twice.')];
      return settingFaults(at, field, setting);
    }),
    ...commands.flatMap(({command, speedMps, rampS}, index) => {
      const at = `touch.commands.${index}`;
      const faults = rangeFaults(`${at}.rampS`, lineField('rampS'), rampS);
      if (command === 'run' && !speedMps)
        faults.push(fault(`${at}.speedMps`, undefined, 'A run needs its speeds.'));
      if (command !== 'run' && speedMps)
        faults.push(fault(`${at}.speedMps`, speedMps, 'Only with run.'));
      if (speedMps) faults.push(...rangeFaults(`${at}.speedMps`, lineField('speedMps'), speedMps));
      return faults;
    }),
  ];
}

function settingFaults(
  at: string,
  field: Field,
  {lowest, highest, choices}: Touch['settings'][number],
): Fault[] {
  const faults: Fault[] = [];
  for (const [name, value] of Object.entries({lowest, highest})) {
    if (value !== undefined && !isWithin(field, value))
      faults.push(fault(`${at}.${name}`, value, rangeOf(field)));
  }
  if (lowest !== undefined && highest !== undefined && lowest > highest)
    faults.push(fault(`${at}.highest`, highest, 'Must not be below lowest.'));
  for (const [index, choice] of (choices ?? []).entries()) {
    const isKnown =
      typeof choice === 'number' && field.choices === undefined
        ? isWithin(field, choice)
        : typeof choice === 'boolean'
          ? field.kind === 'boolean'
          : field.choices?.includes(choice);
    if (isKnown !== true)
      faults.push(fault(`${at}.choices.${index}`, choice, 'No value of this setting.'));
  }
  return faults;
}

function rangeFaults(at: string, field: Field, range: readonly [number, number]): Fault[] {
  const faults = range.flatMap((value, index) =>
    isWithin(field, value) ? [] : [fault(`${at}.${index}`, value, rangeOf(field))],
  );
  if (range[0] > range[1]) faults.push(fault(`${at}.1`, range[1], 'Must not be below the first.'));
  return faults;
}

function lineField(path: string): Field {
  const field = LINE_FIELDS.find((each) => each.path === path);
  if (!field) throw new Error(`no line field ${path}`);
  return field;
}

function isWithin({lowest, highest}: Field, value: number): boolean {
  return value >= (lowest ?? -Infinity) && value <= (highest ?? Infinity);
}

function rangeOf({lowest, highest, unit}: Field): string {
  return `Allowed: ${lowest ?? ''} … ${highest ?? ''} ${unit}`.trim();
}

function fault(path: string, value: unknown, message: string): Fault {
  return {path, message, ...(value !== undefined && {value})};
}
