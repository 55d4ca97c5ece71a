import * as z from 'zod';
import {type Scenario as ScenarioDocument} from '#sim-core/index';
import {
  AT_FIELD,
  DISTURB_FIELDS,
  FIELDS,
  LINE_FIELDS,
  MOST_ENTRIES,
  SET_FIELDS,
} from '#sim-core/scenario/fields';
import {actShapeOf, fieldsOf, keyOf, shapeOf, valueOf} from './field-schema';
import {rulesBetweenKeys} from './rules-between-keys';

const atS = valueOf(AT_FIELD);

/** One section of the document, or the document's own keys for ''. */
function section(name: string): Record<string, z.ZodType> {
  return shapeOf(fieldsOf(FIELDS, name));
}

/** Keys of one kind of sensing, `kind` among them. */
function sensing(kind: 'loadCell' | 'dancer') {
  const fields = fieldsOf(FIELDS, 'sensing').filter(
    (field) => keyOf(field) !== 'kind' && (field.onlyWith ?? kind) === kind,
  );
  return z.strictObject({kind: z.literal(kind), ...shapeOf(fields)});
}

/** One line command with its keys and no others: `speedMps` belongs to `run` alone. */
function lineCommand(command: 'run' | 'stop' | 'fastStop') {
  const fields = LINE_FIELDS.filter(
    (field) => keyOf(field) !== 'command' && (field.onlyCommand?.includes(command) ?? true),
  );
  return z.strictObject({atS, command: z.literal(command), ...shapeOf(fields)});
}

const Line = z.discriminatedUnion('command', [
  lineCommand('run'),
  lineCommand('stop'),
  lineCommand('fastStop'),
]);

/** A change with at least one key. */
function change(shape: Record<string, z.ZodType>) {
  return z.strictObject(shape).refine((keys) => Object.keys(keys).length > 0, {
    error: 'At least one key.',
  });
}

const Action = z
  .strictObject({
    atS,
    set: z.exactOptional(change(actShapeOf(SET_FIELDS))),
    disturb: z.exactOptional(change(actShapeOf(DISTURB_FIELDS))),
  })
  .refine((action) => 'set' in action !== 'disturb' in action, {
    error: 'One of set, disturb.',
  });

const shape = z.strictObject({
  format: z.literal('evenspan.scenario/1' satisfies ScenarioDocument['format']),
  ...section(''),
  web: z.strictObject(section('web')),
  roll: z.strictObject(section('roll')),
  span: z.strictObject(section('span')),
  brake: z.strictObject(section('brake')),
  sensing: z.discriminatedUnion('kind', [sensing('loadCell'), sensing('dancer')]),
  controller: z.strictObject(section('controller')),
  line: z.array(Line).max(MOST_ENTRIES),
  actions: z.array(Action).max(MOST_ENTRIES),
});

// A second step: rules between keys make sense only when each key is right by itself.
const rules = z.custom<z.output<typeof shape>>().superRefine((document, context) => {
  const checked = document as unknown as ScenarioDocument; // by the table that the type describes
  for (const {path, message} of rulesBetweenKeys(checked))
    context.addIssue({code: 'custom', path: [...path], message});
});

/**
 * The scenario document as it travels, made from the engine's own table of fields. What it accepts, the engine
 * accepts, but for one thing that only the engine can work out: whether the plant is too stiff to be stepped.
 */
export const Scenario = shape.pipe(rules) as unknown as z.ZodType<ScenarioDocument>;
export type Scenario = ScenarioDocument;
