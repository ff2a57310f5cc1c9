/**
 * Materials of a line drawing: an outline of constant width around a solid, and a hatch of constant pitch on the screen.
 * Both work in px of the drawing buffer, so a drawing looks the same at any zoom.
 */
import { BackSide, Color, ShaderMaterial, Vector2 } from 'three';

/** Size of the drawing buffer, px; every material shares it and the stage keeps it. */
export const bufferSize = new Vector2(1, 1);

const OUTLINE_VERTEX = /* glsl */ `
  uniform vec2 buffer;
  uniform float width;
  void main() {
    vec4 clip = projectionMatrix * modelViewMatrix * vec4(position, 1.0);
    vec2 away = (normalMatrix * normal).xy;
    float size = length(away);
    if (size > 1e-4) clip.xy += away / size * width * 2.0 / buffer * clip.w;
    gl_Position = clip;
  }`;

const PLAIN_FRAGMENT = /* glsl */ `
  uniform vec3 ink;
  void main() {
    gl_FragColor = vec4(ink, 1.0);
    #include <colorspace_fragment>
  }`;

/** Draws the back of a solid a little larger than it is: what remains to be seen is its outline. */
export function outlineMaterial(ink: string, width: number): ShaderMaterial {
  return new ShaderMaterial({
    uniforms: { buffer: { value: bufferSize }, width: { value: width }, ink: { value: new Color(ink) } },
    vertexShader: OUTLINE_VERTEX,
    fragmentShader: PLAIN_FRAGMENT,
    side: BackSide,
  });
}

const HATCH_VERTEX = /* glsl */ `
  void main() {
    gl_Position = projectionMatrix * modelViewMatrix * vec4(position, 1.0);
  }`;

const HATCH_FRAGMENT = /* glsl */ `
  uniform vec3 ground;
  uniform vec3 line;
  uniform float pitch;
  uniform float share;
  void main() {
    float across = mod(gl_FragCoord.x + gl_FragCoord.y, pitch) / pitch;
    gl_FragColor = vec4(across < share ? line : ground, 1.0);
    #include <colorspace_fragment>
  }`;

export function hatchMaterial(ground: string, line: string, pitch: number, share: number): ShaderMaterial {
  return new ShaderMaterial({
    uniforms: {
      ground: { value: new Color(ground) },
      line: { value: new Color(line) },
      pitch: { value: pitch },
      share: { value: share },
    },
    vertexShader: HATCH_VERTEX,
    fragmentShader: HATCH_FRAGMENT,
  });
}
