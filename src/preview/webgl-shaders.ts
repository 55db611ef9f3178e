/** GLSL ES 3. Biases as in `bias.ts`: clip z moves by clipBias × bias, which is exact for both. */
import { tonesPerItem } from './stage'

export const panelVertex = `
precision highp float;
uniform mat4 clip;
uniform float clipBias;
uniform float sideBias;
in vec3 position;
in float item;
in float rank;
flat out int itemIndex;
void main() {
  itemIndex = int(item);
  gl_Position = clip * vec4(position, 1.0);
  gl_Position.z -= clipBias * (rank + sideBias);
}
`

export const panelFragment = `
precision highp float;
precision highp sampler2D;
uniform sampler2D tones;
uniform float sideTone;
uniform float hatch;
uniform vec2 viewport;
uniform vec4 film;
flat in int itemIndex;
out vec4 colour;
void main() {
  if (film.a > 0.0) {
    colour = vec4(film.rgb * film.a, film.a);
    return;
  }
  vec2 px = floor(vec2(gl_FragCoord.x, viewport.y - gl_FragCoord.y));
  int stripe = int(floor((px.x + px.y) / hatch)) & 1;
  int texel = ${tonesPerItem} * itemIndex + int(sideTone) + 2 * stripe;
  int columns = textureSize(tones, 0).x;
  colour = vec4(texelFetch(tones, ivec2(texel % columns, texel / columns), 0).rgb, 1.0);
}
`

export const lineVertex = `
precision highp float;
uniform mat4 clip;
uniform float clipBias;
uniform vec2 viewport;
uniform float lineWidth;
uniform float bias;
in vec2 corner;
in vec3 start;
in vec3 end;
out float along;
void main() {
  vec4 a = clip * vec4(start, 1.0);
  vec4 b = clip * vec4(end, 1.0);
  vec2 pa = a.xy / a.w * viewport * 0.5;
  vec2 pb = b.xy / b.w * viewport * 0.5;
  float len = length(pb - pa);
  vec2 dir = len > 1e-6 ? (pb - pa) / len : vec2(1.0, 0.0);
  // Wide lines end half their width beyond their ends, so that corners close.
  float beyond = lineWidth > 2.0 ? lineWidth * 0.5 : 0.0;
  along = mix(-beyond, len + beyond, corner.x);
  vec2 p = pa + dir * along + vec2(-dir.y, dir.x) * corner.y * lineWidth * 0.5;
  float share = len > 1e-6 ? along / len : 0.0;
  float z = mix(a.z / a.w, b.z / b.w, share) - clipBias * bias * mix(1.0 / a.w, 1.0 / b.w, share);
  gl_Position = vec4(p / (viewport * 0.5), z, 1.0);
}
`

export const lineFragment = `
precision highp float;
uniform vec4 ink;
uniform float dash;
in float along;
out vec4 colour;
void main() {
  if (dash > 0.0 && mod(abs(along), dash) >= dash * 0.5) discard;
  colour = vec4(ink.rgb * ink.a, ink.a);
}
`
