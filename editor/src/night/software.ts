/** Names that WebGL goes by where the processor draws for it. */
const SOFTWARE = /swiftshader|llvmpipe|softpipe|software|basic render|warp/i;

let known: boolean | null = null;

/**
 * Whether WebGL is worked out by the processor here, or there is none: reading a picture back from it then takes
 * longer than making it without.
 */
export function isWebglSlow(): boolean {
  known ??= ask();
  return known;
}

function ask(): boolean {
  const gl = document.createElement('canvas').getContext('webgl2', { powerPreference: 'low-power' });
  if (gl === null) return true;
  const names = gl.getExtension('WEBGL_debug_renderer_info');
  const renderer = gl.getParameter(names?.UNMASKED_RENDERER_WEBGL ?? gl.RENDERER);
  gl.getExtension('WEBGL_lose_context')?.loseContext();
  return SOFTWARE.test(String(renderer));
}
