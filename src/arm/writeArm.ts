import type { ArmFile } from './armFile.ts';

const WIDTH = 120;

/**
 * JSON that people read and compare: two blanks a level, and every list or object that fits on its line stays on it (a vector, a bearing). Keys keep
 * their order and undefined ones are left out, so the same value always gives the same text. `used` is what already stands on the line.
 */
function pretty(value: unknown, indent: string, used: number): string {
  const line = inline(value);
  if (used + line.length <= WIDTH || typeof value !== 'object' || value === null) return line;
  const deeper = `${indent}  `;
  const parts = Array.isArray(value)
    ? value.map((entry) => pretty(entry, deeper, deeper.length + 1))
    : entriesOf(value).map(([key, entry]) => {
        const head = `${JSON.stringify(key)}: `;
        return head + pretty(entry, deeper, deeper.length + head.length + 1);
      });
  const [open, close] = Array.isArray(value) ? ['[', ']'] : ['{', '}'];
  return `${open}\n${deeper}${parts.join(`,\n${deeper}`)}\n${indent}${close}`;
}

function entriesOf(value: object): [string, unknown][] {
  return Object.entries(value).filter(([, entry]) => entry !== undefined);
}

function inline(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(inline).join(', ')}]`;
  if (typeof value !== 'object' || value === null) return JSON.stringify(value);
  const entries = entriesOf(value);
  if (entries.length === 0) return '{}';
  return `{ ${entries.map(([key, entry]) => `${JSON.stringify(key)}: ${inline(entry)}`).join(', ')} }`;
}

/** The text of an arm file, ending in a line break. Reading it back gives an equal file, and writing that gives the same text. */
export function writeArm(file: ArmFile): string {
  return `${pretty(file, '', 0)}\n`;
}

/** Any plain value in the same layout, such as the generated JSON Schema. */
export function writeJson(value: unknown): string {
  return `${pretty(value, '', 0)}\n`;
}
