/** The colours of drawn plans. Canvas knows no custom properties, so those of the marks live here as well. */
export const ink = '#16202E';
export const dusk = '#2B3A55';
export const paper = '#FBF8F2';
export const chalk = '#EDE6D8';
export const lamp = '#E8A33D';
export const moss = '#5B7152';
export const grey = '#7A828E';
/** Two hues of the open Okabe-Ito palette, told apart by people of every colour vision. */
export const dimBlue = '#0072B2';
export const overRed = '#D55E00';

export const fontFamily = '"Work Sans", system-ui, sans-serif';

/** Between two #rrggbb colours; share 0 gives the first. */
export function mix(a: string, b: string, share: number): string {
  const part = (i: number): string => {
    const from = Number.parseInt(a.slice(i, i + 2), 16);
    const to = Number.parseInt(b.slice(i, i + 2), 16);
    return Math.round(from + (to - from) * share)
      .toString(16)
      .padStart(2, '0');
  };
  return `#${part(1)}${part(3)}${part(5)}`;
}
