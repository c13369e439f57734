import { GLOW_TINT_SHARE, type LightMap, type Look } from '@lampwright/geometry/night';
import type { NightPhoto, NightRenderer, PictureSize } from './night-renderer';
import { photoPixels } from './photo-pixels';
import { FRAGMENT, VERTEX } from './shader';

type Uniform =
  | 'photo'
  | 'light'
  | 'leaves'
  | 'size'
  | 'ambient'
  | 'ink'
  | 'saturation'
  | 'litSaturation'
  | 'knee'
  | 'gain'
  | 'glowGain'
  | 'tintFloor';

/** What lives in the graphics context, and is lost with it. */
interface Parts {
  readonly uniforms: ReadonlyMap<Uniform, WebGLUniformLocation | null>;
}

/** Whether WebGL draws here; known once it was tried. */
let works: boolean | null = null;

/** Tries it on a canvas that is thrown away: one that has had a WebGL context can't have another kind. */
function draws(): boolean {
  const gl = contextOf(document.createElement('canvas'));
  if (!gl) return false;
  try {
    partsOf(gl);
    return !gl.isContextLost() && gl.getError() === gl.NO_ERROR;
  } catch {
    return false;
  } finally {
    gl.getExtension('WEBGL_lose_context')?.loseContext();
  }
}

function contextOf(canvas: HTMLCanvasElement): WebGL2RenderingContext | null {
  return canvas.getContext('webgl2', {
    alpha: false,
    antialias: false,
    depth: false,
    powerPreference: 'low-power',
    preserveDrawingBuffer: true,
  });
}

/** Composes by WebGL 2: photo and light are textures, the light half floats that are read between its pixels. */
export class WebglNight implements NightRenderer {
  readonly kind = 'webgl';
  private photo!: ImageData;
  private parts: Parts | null = null;
  /** The light map that the texture was last filled from. */
  private filled: LightMap | null = null;
  private last: { light: LightMap; look: Look; whiteLux: number } | null = null;

  /** Null where there is no WebGL 2, or none that draws this. */
  static on(canvas: HTMLCanvasElement, photo: NightPhoto, size: PictureSize): WebglNight | null {
    works ??= draws();
    const gl = works ? contextOf(canvas) : null;
    if (!gl) return null;
    const night = new WebglNight(canvas, gl);
    night.setPhoto(photo, size);
    return night;
  }

  private constructor(
    private readonly canvas: HTMLCanvasElement,
    private readonly gl: WebGL2RenderingContext,
  ) {
    canvas.addEventListener('webglcontextlost', this.onLost);
    canvas.addEventListener('webglcontextrestored', this.onRestored);
    this.parts = partsOf(gl);
  }

  setPhoto(photo: NightPhoto, size: PictureSize): void {
    this.canvas.width = size.width;
    this.canvas.height = size.height;
    this.photo = photoPixels(photo, size);
    this.fillPhoto();
  }

  draw(light: LightMap, look: Look, whiteLux: number): void {
    this.last = { light, look, whiteLux };
    const { gl, parts, photo } = this;
    if (!parts || gl.isContextLost()) return;
    const grade = look[light.view];
    this.fillLight(light);
    gl.viewport(0, 0, photo.width, photo.height);
    const at = (name: Uniform) => parts.uniforms.get(name) ?? null;
    gl.uniform2f(at('size'), photo.width, photo.height);
    gl.uniform3f(at('ambient'), ...grade.ambient);
    gl.uniform3f(at('ink'), ...grade.ink);
    gl.uniform1f(at('saturation'), grade.saturation);
    gl.uniform1f(at('litSaturation'), grade.litSaturation);
    gl.uniform1f(at('knee'), grade.knee);
    gl.uniform1f(at('gain'), grade.lamps / whiteLux);
    gl.uniform1f(at('glowGain'), grade.lamps);
    gl.uniform1f(at('tintFloor'), GLOW_TINT_SHARE * whiteLux);
    gl.drawArrays(gl.TRIANGLES, 0, 3);
  }

  drawn(): Promise<void> {
    return Promise.resolve();
  }

  dispose(): void {
    this.canvas.removeEventListener('webglcontextlost', this.onLost);
    this.canvas.removeEventListener('webglcontextrestored', this.onRestored);
    this.parts = null;
    this.last = null;
    this.gl.getExtension('WEBGL_lose_context')?.loseContext();
  }

  /** Says that the context is wanted back. */
  private readonly onLost = (event: Event): void => {
    event.preventDefault();
    this.parts = null;
    this.filled = null;
  };

  private readonly onRestored = (): void => {
    this.parts = partsOf(this.gl);
    this.fillPhoto();
    if (this.last) this.draw(this.last.light, this.last.look, this.last.whiteLux);
  };

  private fillPhoto(): void {
    const { gl } = this;
    gl.activeTexture(gl.TEXTURE0);
    gl.texImage2D(gl.TEXTURE_2D, 0, gl.RGBA8, gl.RGBA, gl.UNSIGNED_BYTE, this.photo);
  }

  private fillLight(light: LightMap): void {
    const { gl, filled } = this;
    const { width, height, rgba, leaves, version } = light;
    const isNewSize = !filled || filled.width !== width || filled.height !== height;
    if (isNewSize || filled.leaves !== leaves) {
      gl.activeTexture(gl.TEXTURE2);
      gl.texImage2D(gl.TEXTURE_2D, 0, gl.R8, width, height, 0, gl.RED, gl.UNSIGNED_BYTE, leaves);
    }
    gl.activeTexture(gl.TEXTURE1);
    if (isNewSize) {
      gl.texImage2D(gl.TEXTURE_2D, 0, gl.RGBA16F, width, height, 0, gl.RGBA, gl.FLOAT, rgba);
    } else if (filled.rgba !== rgba || filled.version !== version) {
      gl.texSubImage2D(gl.TEXTURE_2D, 0, 0, 0, width, height, gl.RGBA, gl.FLOAT, rgba);
    }
    this.filled = light;
  }
}

function partsOf(gl: WebGL2RenderingContext): Parts {
  const program = gl.createProgram();
  for (const [type, source] of [
    [gl.VERTEX_SHADER, VERTEX],
    [gl.FRAGMENT_SHADER, FRAGMENT],
  ] as const) {
    const shader = gl.createShader(type);
    // Null only in a context that is lost again already; the next restoring begins anew.
    if (!shader) continue;
    gl.shaderSource(shader, source);
    gl.compileShader(shader);
    gl.attachShader(program, shader);
    gl.deleteShader(shader);
  }
  gl.linkProgram(program);
  if (!gl.getProgramParameter(program, gl.LINK_STATUS) && !gl.isContextLost())
    throw new Error(`The night picture’s shader does not link: ${gl.getProgramInfoLog(program)}`);
  // biome-ignore lint/correctness/useHookAtTopLevel: WebGL's own name, no hook of React.
  gl.useProgram(program);
  // One triangle over the whole picture.
  gl.bindBuffer(gl.ARRAY_BUFFER, gl.createBuffer());
  gl.bufferData(gl.ARRAY_BUFFER, new Float32Array([-1, -1, 3, -1, -1, 3]), gl.STATIC_DRAW);
  const corner = gl.getAttribLocation(program, 'corner');
  gl.enableVertexAttribArray(corner);
  gl.vertexAttribPointer(corner, 2, gl.FLOAT, false, 0, 0);
  gl.disable(gl.DITHER);
  gl.pixelStorei(gl.UNPACK_COLORSPACE_CONVERSION_WEBGL, gl.NONE);
  texture(gl, gl.TEXTURE0, gl.NEAREST);
  texture(gl, gl.TEXTURE1, gl.LINEAR);
  texture(gl, gl.TEXTURE2, gl.LINEAR);
  gl.pixelStorei(gl.UNPACK_ALIGNMENT, 1);
  const names: Uniform[] = [
    'photo',
    'light',
    'leaves',
    'size',
    'ambient',
    'ink',
    'saturation',
    'litSaturation',
    'knee',
    'gain',
    'glowGain',
    'tintFloor',
  ];
  const uniforms = new Map(names.map((name) => [name, gl.getUniformLocation(program, name)]));
  gl.uniform1i(uniforms.get('photo') ?? null, 0);
  gl.uniform1i(uniforms.get('light') ?? null, 1);
  gl.uniform1i(uniforms.get('leaves') ?? null, 2);
  return { uniforms };
}

function texture(gl: WebGL2RenderingContext, unit: number, filter: number): WebGLTexture {
  const made = gl.createTexture();
  gl.activeTexture(unit);
  gl.bindTexture(gl.TEXTURE_2D, made);
  gl.texParameteri(gl.TEXTURE_2D, gl.TEXTURE_MIN_FILTER, filter);
  gl.texParameteri(gl.TEXTURE_2D, gl.TEXTURE_MAG_FILTER, filter);
  gl.texParameteri(gl.TEXTURE_2D, gl.TEXTURE_WRAP_S, gl.CLAMP_TO_EDGE);
  gl.texParameteri(gl.TEXTURE_2D, gl.TEXTURE_WRAP_T, gl.CLAMP_TO_EDGE);
  return made;
}
