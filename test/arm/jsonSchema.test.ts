import { readFileSync, writeFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import * as z from 'zod';
import { unitOfKey } from '../../src/arm/fileUnits.ts';
import { armJsonSchema, fieldReference, type JsonSchema } from '../../src/arm/jsonSchema.ts';
import { writeJson } from '../../src/arm/writeArm.ts';
import { unitOf } from '../../src/units/unit.ts';
import { CONTRACT_EXAMPLE } from './contractExample.ts';
import { wholeFile } from './wholeFile.ts';

describe('the JSON Schema', () => {
  it('in models/arm.schema.json is the generated one (WRITE_SCHEMA=1 writes it anew)', () => {
    const place = new URL('../../models/arm.schema.json', import.meta.url);
    const generated = writeJson(armJsonSchema());
    if (process.env.WRITE_SCHEMA === '1') writeFileSync(place, generated);
    expect(readFileSync(place, 'utf8')).toBe(generated);
  });

  it('accepts sound files and refuses broken ones, read back by itself', () => {
    const schema = z.fromJSONSchema(armJsonSchema() as Parameters<typeof z.fromJSONSchema>[0]);
    expect(schema.safeParse(wholeFile()).success).toBe(true);
    expect(schema.safeParse(JSON.parse(CONTRACT_EXAMPLE)).success).toBe(true);
    expect(schema.safeParse({ ...wholeFile(), colour: 'green' }).success).toBe(false);
    expect(schema.safeParse({ ...wholeFile(), gravity_m_s2: [0, 0] }).success).toBe(false);
    expect(schema.safeParse({ ...wholeFile(), tip: undefined }).success).toBe(false);
  });

  it('describes every field and annotates no default that its field would refuse', () => {
    const visit = (schema: JsonSchema, path: string): void => {
      for (const [key, field] of Object.entries(schema.properties ?? {})) {
        expect(field.description, `${path}.${key}`).toBeTruthy();
        if (field.default !== undefined) {
          const check = z.fromJSONSchema(field as Parameters<typeof z.fromJSONSchema>[0]);
          expect(check.safeParse(field.default).success, `${path}.${key}`).toBe(true);
        }
        visit(field, `${path}.${key}`);
      }
      for (const part of [
        ...(schema.oneOf ?? []),
        ...(schema.anyOf ?? []),
        ...(schema.items && !Array.isArray(schema.items) ? [schema.items] : []),
      ]) {
        visit(part as JsonSchema, path);
      }
      if (typeof schema.additionalProperties === 'object') visit(schema.additionalProperties, `${path}.*`);
    };
    visit(armJsonSchema(), '');
  });
});

describe('the field reference', () => {
  const rows = new Map(fieldReference().map((row) => [row.path, row]));

  it('has one row a field, with unit, meaning and default', () => {
    expect(rows.get('joints[].support.span_mm')).toEqual({
      path: 'joints[].support.span_mm',
      unit: 'mm',
      meaning: 'Distance between the bearing centres A and B',
      kinds: ['clevis', 'cantilever'],
      required: true,
      default: '',
    });
    expect(rows.get('joints[].support.offset_mm')).toMatchObject({ kinds: ['clevis'], required: false, default: '0' });
    expect(rows.get('joints[].turn_deg')).toMatchObject({ unit: '°', default: '[0, 0, 0]', kinds: [] });
    expect(rows.get('joints[].support.shaft.sections[].bore_mm')).toMatchObject({ default: 'the bore of the shaft' });
    expect(rows.get('bearings.*.balls')).toMatchObject({ kinds: ['all but plain-bushing'] });
    expect(rows.get('joints[].kind')?.meaning).toBe(
      '`revolute`: A joint that turns; `fixed`: Rigidly merged into the link before it',
    );
  });

  it('names every key of a file that uses everything', () => {
    const visit = (value: unknown, path: string): void => {
      if (Array.isArray(value)) for (const entry of value) visit(entry, `${path}[]`);
      else if (typeof value === 'object' && value !== null) {
        for (const [key, entry] of Object.entries(value)) {
          const at = path === 'bearings' ? 'bearings.*' : path === '' ? key : `${path}.${key}`;
          if (at !== 'bearings.*') expect(rows.has(at), at).toBe(true);
          visit(entry, at);
        }
      }
    };
    visit(wholeFile(), '');
  });

  it('gives every key with a unit one that can be typed', () => {
    for (const row of rows.values()) if (row.unit) expect(() => unitOf(row.unit), row.path).not.toThrow();
    expect(unitOfKey('C0_N')).toBe('N');
    expect(unitOfKey('stiffness_N_um')).toBe('N/µm');
    expect(unitOfKey('pv_limit_MPa_m_s')).toBe('MPa·m/s');
    expect(unitOfKey('accel_deg_s2')).toBe('°/s²');
    expect(unitOfKey('bearings')).toBeNull();
  });
});
