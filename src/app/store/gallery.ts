/** The models that come with the program, by file name; each is fetched only when it is opened. */
const texts = import.meta.glob<string>('../../../models/*.arm.json', { query: '?raw', import: 'default' });

export interface Model {
  readonly file: string;
  /** Of the file name: `picking-arm.arm.json` is "picking arm". */
  readonly label: string;
  text(): Promise<string>;
}

export const FIRST_MODEL = 'picking-arm.arm.json';

export const models: readonly Model[] = Object.entries(texts).map(([path, text]) => {
  const file = path.slice(path.lastIndexOf('/') + 1);
  return { file, label: file.replace(/\.arm\.json$/, '').replaceAll('-', ' '), text };
});
