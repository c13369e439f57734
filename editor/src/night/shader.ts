import { DITHER_EDGE, GAP_BLUE, GLOW_TINT, LUMA } from '@lampwright/geometry/night';

export const VERTEX = `#version 300 es
in vec2 corner;
void main() { gl_Position = vec4(corner, 0.0, 1.0); }
`;

const number = (n: number): string => (Number.isInteger(n) ? `${n}.0` : `${n}`);
const vector = (v: readonly [number, number, number]): string => `vec3(${v.map(number).join(', ')})`;

/** What composeRows of geometry does, a pixel: keep the two alike. */
export const FRAGMENT = `#version 300 es
precision highp float;
precision highp int;
uniform sampler2D photo;
uniform sampler2D light;
uniform sampler2D leaves;
uniform vec2 size;
uniform vec3 ambient;
uniform vec3 ink;
uniform float saturation;
uniform float litSaturation;
uniform float knee;
uniform float gain;
uniform float glowGain;
uniform float tintFloor;
out vec4 picture;

const vec3 LUMA = ${vector(LUMA)};
const vec3 GLOW_TINT = ${vector(GLOW_TINT)};
const float EDGE = ${number(DITHER_EDGE)};

vec3 linearOf(vec3 s) {
  return mix(pow((s + 0.055) / 1.055, vec3(2.4)), s / 12.92, lessThanEqual(s, vec3(0.04045)));
}
vec3 encodedOf(vec3 l) {
  return mix(1.055 * pow(l, vec3(1.0 / 2.4)) - 0.055, l * 12.92, lessThanEqual(l, vec3(0.0031308)));
}
uint hashOf(uvec2 p) {
  uint h = (p.x + 1u) * 0x9e3779b1u ^ (p.y + 1u) * 0x85ebca77u;
  h = (h ^ (h >> 15)) * 0x2c1b3c6du;
  h = (h ^ (h >> 12)) * 0x297a2d39u;
  return h ^ (h >> 15);
}
void main() {
  ivec2 at = ivec2(gl_FragCoord.x, size.y - gl_FragCoord.y);
  vec2 where = (vec2(at) + 0.5) / size;
  vec4 lux = texture(light, where);
  vec3 surface = linearOf(texelFetch(photo, at, 0).rgb);
  vec3 grey = vec3(dot(LUMA, surface));
  float gap = smoothstep(${number(GAP_BLUE[0])}, ${number(GAP_BLUE[1])}, surface.b) * texture(leaves, where).r;
  vec3 dark2 = (1.0 - grey) * (1.0 - grey);
  vec3 seen = mix(grey, surface, saturation) * ambient + dark2 * dark2 * dark2 * dark2 * dark2 * dark2 * ink;
  seen += mix(grey, surface, litSaturation) * lux.rgb * gain * (1.0 - gap);
  vec3 tint = lux.rgb + tintFloor * GLOW_TINT;
  seen += tint * (glowGain * lux.a / dot(LUMA, tint));
  float room = max(1.0 - knee, 1e-6);
  vec3 soft = knee + room * (1.0 - exp((knee - seen) / room));
  seen = clamp(mix(soft, seen, lessThanEqual(seen, vec3(knee))), 0.0, 1.0);
  uint h = hashOf(uvec2(at));
  vec3 noise = vec3(uvec3(h, h >> 10, h >> 20) & 0x3ffu) / 1024.0;
  picture = vec4(floor(255.0 * encodedOf(seen) + EDGE + noise * (1.0 - 2.0 * EDGE)) / 255.0, 1.0);
}
`;
