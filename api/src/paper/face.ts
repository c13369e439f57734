import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';

/** The weights of the product's typeface that paper uses. */
export const weights = ['regular', 'medium', 'semibold'] as const;
export type Weight = (typeof weights)[number];

// As far from the sources as from what is built of them.
const folder = new URL('../../../fonts/', import.meta.url);

const read = (name: string): Buffer => readFileSync(fileURLToPath(new URL(name, folder)));

let faces: Readonly<Record<Weight, Buffer>> | undefined;

/** The font files, read once. */
export function fontFiles(): Readonly<Record<Weight, Buffer>> {
  faces ??= {
    regular: read('WorkSans-Regular.ttf'),
    medium: read('WorkSans-Medium.ttf'),
    semibold: read('WorkSans-SemiBold.ttf'),
  };
  return faces;
}

/** Ink on paper: every line and letter reads in black and white; hues only tint what shape already tells. */
export const colours = {
  ink: '#16202E',
  quiet: '#4A5568',
  rule: '#C9C2B4',
  chalk: '#EDE6D8',
  paper: '#FFFFFF',
  lamp: '#E8A33D',
} as const;
