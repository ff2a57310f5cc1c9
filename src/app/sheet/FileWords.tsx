/** Words of the engine that name keys of the arm file between backticks, with the keys set apart. */
export function FileWords({ text }: { text: string }) {
  // keys stand at the odd places
  return text.split('`').map((part, k) => (k % 2 === 0 ? part : <code key={part}>{part}</code>));
}
