export interface Place {
  readonly latitude: number;
  readonly longitude: number;
}

/** Four decimals are some ten metres: sunset needs far less. */
const rounded = (degrees: number) => Math.round(degrees * 1e4) / 1e4;

const byHand = 'You can write the numbers in instead.';
const blocked = `The browser does not give this device’s place. Allow it for this site, then try again. ${byHand}`;
const unknown = `This device can’t tell where it is at the moment. ${byHand}`;
const tooLong = `Finding this device’s place took too long. Try again where it sees the sky. ${byHand}`;
const missing = `This browser can’t tell where the device is. ${byHand}`;

const TIMEOUT_MS = 20_000;
const RECENT_MS = 10 * 60_000;

/** @throws Error with a sentence for the person, where the device does not tell its place */
export function devicePlace(geolocation: Geolocation | undefined): Promise<Place> {
  return new Promise((resolve, reject) => {
    if (!geolocation) return reject(new Error(missing));
    geolocation.getCurrentPosition(
      ({ coords }) => resolve({ latitude: rounded(coords.latitude), longitude: rounded(coords.longitude) }),
      ({ code, PERMISSION_DENIED, TIMEOUT }) =>
        reject(new Error(code === PERMISSION_DENIED ? blocked : code === TIMEOUT ? tooLong : unknown)),
      { enableHighAccuracy: false, timeout: TIMEOUT_MS, maximumAge: RECENT_MS },
    );
  });
}
