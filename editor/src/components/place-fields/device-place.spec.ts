import { expect, it } from 'vitest';
import { devicePlace } from './device-place';

const codes = { PERMISSION_DENIED: 1, POSITION_UNAVAILABLE: 2, TIMEOUT: 3 } as const;

function device(answer: { latitude: number; longitude: number } | (typeof codes)[keyof typeof codes]) {
  const getCurrentPosition: Geolocation['getCurrentPosition'] = (tell, refuse) => {
    if (typeof answer === 'number')
      refuse?.({ ...codes, code: answer, message: '' } as GeolocationPositionError);
    else tell({ coords: answer } as GeolocationPosition);
  };
  return { getCurrentPosition } as Geolocation;
}

it('takes the place no finer than sunset needs', async () => {
  expect(await devicePlace(device({ latitude: 40.207123456, longitude: -75.01241987 }))).toEqual({
    latitude: 40.2071,
    longitude: -75.0124,
  });
});

it.each([
  ['is not allowed to', device(codes.PERMISSION_DENIED), /Allow it for this site/],
  ['knows none', device(codes.POSITION_UNAVAILABLE), /can’t tell where it is/],
  ['takes too long', device(codes.TIMEOUT), /took too long/],
  ['has no way to', undefined, /This browser can’t tell/],
])('says what to do where the device %s', async (_, geolocation, sentence) => {
  const refused = devicePlace(geolocation);
  await expect(refused).rejects.toThrow(sentence);
  await expect(refused).rejects.toThrow(/write the numbers in/);
});
