import * as z from 'zod/mini';
import { armFileSchema, fieldAbout } from './armFile.ts';
import { unitOfKey } from './fileUnits.ts';

/** As much of JSON Schema (draft 7, which editors know best) as the generated one uses. */
export interface JsonSchema {
  readonly $schema?: string;
  readonly type?: string;
  readonly description?: string;
  readonly default?: unknown;
  /** Words for a default that is no fixed value; folded into the description of the published schema. */
  readonly otherwise?: string;
  readonly const?: unknown;
  readonly enum?: readonly unknown[];
  readonly properties?: Readonly<Record<string, JsonSchema>>;
  readonly required?: readonly string[];
  readonly additionalProperties?: boolean | JsonSchema;
  readonly items?: JsonSchema | readonly JsonSchema[];
  readonly anyOf?: readonly JsonSchema[];
  readonly oneOf?: readonly JsonSchema[];
}

function generate(fold: boolean): JsonSchema {
  const schema = z.toJSONSchema(armFileSchema, {
    target: 'draft-07',
    metadata: fieldAbout,
    io: 'input',
    override: ({ jsonSchema }) => {
      const about = jsonSchema as { description?: string; otherwise?: string };
      if (!fold || about.otherwise === undefined) return;
      about.description += `; left out: ${about.otherwise}`;
      delete about.otherwise;
    },
  });
  return {
    title: 'Arm file',
    description: 'A serial arm with its bearings, loads and targets',
    ...schema,
  } as JsonSchema;
}

/** The JSON Schema of an arm file; `models/arm.schema.json` is this, and a test holds the two equal. */
export function armJsonSchema(): JsonSchema {
  return generate(true);
}

/** One row of the field reference. */
export interface FieldRow {
  /** `joints[].support.span_mm`; `*` stands for a name. The same field of several kinds of object gives one row. */
  readonly path: string;
  readonly unit: string;
  readonly meaning: string;
  /** Kinds (clevis, belt, needle …) that have the field, or `all but` one of many; empty: all. */
  readonly kinds: readonly string[];
  readonly required: boolean;
  /** What stands for it when it is left out; empty: nothing. */
  readonly default: string;
}

interface OpenRow extends FieldRow {
  readonly kinds: string[];
  meaning: string;
}

function kindsOf(schema: JsonSchema): readonly string[] {
  const kind = schema.properties?.arrangement ?? schema.properties?.kind;
  if (!kind) return [];
  return (kind.enum ?? [kind.const]).map(String);
}

function defaultText(field: JsonSchema): string {
  if (field.otherwise !== undefined) return field.otherwise;
  if (field.default === undefined) return '';
  return typeof field.default === 'string'
    ? `\`${field.default}\``
    : JSON.stringify(field.default).replaceAll(',', ', ');
}

/** The description, with the values the field may take where they are few. */
function meaningOf(field: JsonSchema): string {
  const about = field.description ?? '';
  if (typeof field.const === 'string') return `\`${field.const}\`: ${about}`;
  const values =
    field.enum ?? (field.anyOf?.every((option) => 'const' in option) ? field.anyOf.map((o) => o.const) : []);
  return values.length > 0 ? `${about} (${values.map((value) => `\`${value}\``).join(', ')})` : about;
}

function collect(schema: JsonSchema, path: string, kinds: readonly string[], rows: Map<string, OpenRow>): void {
  const options = schema.oneOf ?? schema.anyOf;
  if (options) {
    for (const option of options) collect(option, path, kindsOf(option), rows);
    return;
  }
  if (schema.items && !Array.isArray(schema.items)) collect(schema.items as JsonSchema, `${path}[]`, [], rows);
  if (typeof schema.additionalProperties === 'object') collect(schema.additionalProperties, `${path}.*`, [], rows);
  for (const [key, field] of Object.entries(schema.properties ?? {})) {
    const at = path === '' ? key : `${path}.${key}`;
    const seen = rows.get(at);
    if (seen) {
      const meaning = meaningOf(field);
      // The field that tells the kinds apart says what each of them is; another may mean something else in another kind.
      if (key === 'kind' || key === 'arrangement') seen.meaning += `; ${meaning}`;
      else if (!seen.meaning.includes(meaning)) seen.meaning += `; ${kinds.join(', ')}: ${meaning}`;
      seen.kinds.push(...kinds);
    } else {
      rows.set(at, {
        path: at,
        unit: unitOfKey(key) ?? '',
        meaning: meaningOf(field),
        kinds: [...kinds],
        required: schema.required?.includes(key) ?? false,
        default: defaultText(field),
      });
    }
    collect(field, at, [], rows);
  }
}

/** Rows of the field reference, from the top of the file down, for the README. */
export function fieldReference(): readonly FieldRow[] {
  const rows = new Map<string, OpenRow>();
  collect(generate(false), '', [], rows);
  const all = new Map([...rows.values()].map((row) => [row.path, row]));
  return [...rows.values()].map((row) => {
    const parent = row.path.slice(0, row.path.lastIndexOf('.'));
    const kinds = all.get(`${parent}.arrangement`)?.kinds ?? all.get(`${parent}.kind`)?.kinds ?? [];
    const without = kinds.filter((kind) => !row.kinds.includes(kind));
    if (row.kinds.length === 0 || without.length === 0) return { ...row, kinds: [] };
    return kinds.length > 4 && without.length === 1 ? { ...row, kinds: [`all but ${without[0]}`] } : row;
  });
}
