/** A number that carries its unit in its type, so that a bare `number` never means two things. */
declare const unit: unique symbol;
export type Branded<U extends string> = number & { readonly [unit]: U };

export type Meters = Branded<'meters'>;
export type SquareMeters = Branded<'square-meters'>;
/** Sheet pixels: the pixels of the stored sheet image, origin at its top left corner. */
export type Pixels = Branded<'pixels'>;
export type Volts = Branded<'volts'>;
export type Amperes = Branded<'amperes'>;
export type Ohms = Branded<'ohms'>;
export type Watts = Branded<'watts'>;
export type VoltAmperes = Branded<'volt-amperes'>;
export type Celsius = Branded<'celsius'>;

export const meters = (n: number): Meters => n as Meters;
export const squareMeters = (n: number): SquareMeters => n as SquareMeters;
export const pixels = (n: number): Pixels => n as Pixels;
export const volts = (n: number): Volts => n as Volts;
export const amperes = (n: number): Amperes => n as Amperes;
export const ohms = (n: number): Ohms => n as Ohms;
export const watts = (n: number): Watts => n as Watts;
export const voltAmperes = (n: number): VoltAmperes => n as VoltAmperes;
export const celsius = (n: number): Celsius => n as Celsius;

/** A place on a sheet, in sheet pixels. */
export interface SheetPoint {
  readonly x: Pixels;
  readonly y: Pixels;
}

/** A place on the ground, in metres; x to the right, y away from the viewer (up the plan). */
export interface GroundPoint {
  readonly x: Meters;
  readonly y: Meters;
}
