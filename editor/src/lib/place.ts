/** "40.2° N, 75° W". */
export function placeText({ latitude, longitude }: { latitude: number; longitude: number }): string {
  const north = `${Math.abs(latitude)}° ${latitude < 0 ? 'S' : 'N'}`;
  const east = `${Math.abs(longitude)}° ${longitude < 0 ? 'W' : 'E'}`;
  return `${north}, ${east}`;
}
