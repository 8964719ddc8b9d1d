/**
 * The field by Three.js: one flat mesh drawn twice (edited half, mirrored half) by an orthographic camera that
 * counts in CSS pixels; the colour is looked up for every pixel in a 256 x 1 texture of the map. Drawn on demand only.
 */
import {
  BufferAttribute,
  BufferGeometry,
  Color,
  DataTexture,
  DoubleSide,
  GLSL3,
  LinearFilter,
  Mesh,
  OrthographicCamera,
  RawShaderMaterial,
  RGBAFormat,
  Scene,
  WebGLRenderer,
} from "three";
import { mapTable } from "../colours.ts";
import type { Rgb } from "../colours.ts";
import { freshCanvas, veils } from "./fieldLayer.ts";
import type { FieldLayer, FieldPicture } from "./fieldLayer.ts";
import type { View } from "./view.ts";

const TABLE = 256;

const VERTEX = `
uniform mat4 modelViewMatrix;
uniform mat4 projectionMatrix;
in vec3 position;
in float value;
out float vValue;
void main() {
  vValue = value;
  gl_Position = projectionMatrix * modelViewMatrix * vec4(position, 1.0);
}`;

// The table's first and last entries sit at the middles of its end texels.
const FRAGMENT = `
precision highp float;
uniform sampler2D map;
uniform vec2 range;
uniform vec3 sheet;
uniform float veil;
uniform float ghost;
in float vValue;
out vec4 colour;
void main() {
  if (!(vValue > -1.0e30)) discard;
  float share = clamp((vValue - range.x) / (range.y - range.x), 0.0, 1.0);
  vec3 c = texture(map, vec2((share * ${TABLE - 1}.0 + 0.5) / ${TABLE}.0, 0.5)).rgb;
  c = mix(c, vec3(dot(c, vec3(0.3, 0.59, 0.11))), ghost);
  colour = vec4(mix(c, sheet, veil), 1.0);
}`;

export class GlField implements FieldLayer {
  readonly kind = "webgl";
  readonly canvas = freshCanvas();
  readonly #renderer: WebGLRenderer;
  readonly #scene = new Scene();
  readonly #camera = new OrthographicCamera(0, 1, 0, 1, -1, 1);
  readonly #geometry = new BufferGeometry();
  readonly #halves: readonly Mesh<BufferGeometry, RawShaderMaterial>[];
  #map: DataTexture | undefined;
  #stops: readonly Rgb[] | undefined;
  #mesh: FieldPicture["mesh"] | undefined;

  /**
   * @param onLost called once when the browser takes the drawing context away
   * @throws where WebGL is not to be had
   */
  constructor(onLost: () => void) {
    this.#renderer = new WebGLRenderer({
      canvas: this.canvas,
      alpha: true,
      antialias: true,
      preserveDrawingBuffer: true,
    });
    this.canvas.addEventListener("webglcontextlost", onLost, { once: true });
    this.#halves = [0, 1].map(() => new Mesh(this.#geometry, fieldMaterial()));
    for (const half of this.#halves) {
      half.matrixAutoUpdate = false;
      half.frustumCulled = false;
      this.#scene.add(half);
    }
  }

  draw(picture: FieldPicture): void {
    this.#take(picture);
    this.#renderer.setPixelRatio(picture.pixelRatio);
    this.#renderer.setSize(picture.width, picture.height, false);
    Object.assign(this.#camera, { left: 0, right: picture.width, top: 0, bottom: picture.height });
    this.#camera.updateProjectionMatrix();
    const [edited, mirrored] = veils(picture);
    this.#dress(this.#halves[0]!, picture, edited, 1);
    this.#dress(this.#halves[1]!, picture, mirrored, -1);
    this.#renderer.render(this.#scene, this.#camera);
  }

  /** Takes over mesh, values and map as far as they are new. */
  #take({ mesh, values, stops }: FieldPicture): void {
    if (mesh !== this.#mesh) {
      this.#mesh = mesh;
      const places = new Float32Array(1.5 * mesh.nodes.length);
      for (let i = 0; i < mesh.nodes.length / 2; i++)
        places.set([mesh.nodes[2 * i]!, mesh.nodes[2 * i + 1]!], 3 * i);
      this.#geometry.setAttribute("position", new BufferAttribute(places, 3));
      this.#geometry.setAttribute("value", new BufferAttribute(new Float32Array(values.length), 1));
      this.#geometry.setIndex(new BufferAttribute(mesh.triangles, 1));
    }
    const held = this.#geometry.getAttribute("value") as BufferAttribute;
    for (let i = 0; i < values.length; i++) held.array[i] = Number.isNaN(values[i]!) ? -3e38 : values[i]!;
    held.needsUpdate = true;
    if (stops === this.#stops) return;
    this.#stops = stops;
    this.#map?.dispose();
    this.#map = new DataTexture(mapTable(stops, TABLE), TABLE, 1, RGBAFormat);
    this.#map.minFilter = this.#map.magFilter = LinearFilter;
    this.#map.needsUpdate = true;
  }

  #dress(
    half: Mesh<BufferGeometry, RawShaderMaterial>,
    picture: FieldPicture,
    veil: number,
    sign: 1 | -1,
  ): void {
    half.matrix.set(...placing(picture.view, sign));
    half.matrixWorldNeedsUpdate = true;
    const { uniforms } = half.material;
    uniforms["map"]!.value = this.#map;
    uniforms["range"]!.value = [picture.range.from, picture.range.to];
    uniforms["sheet"]!.value = picture.sheet.map((part) => part / 255);
    uniforms["veil"]!.value = veil;
    uniforms["ghost"]!.value = picture.ghost ? 1 : 0;
  }

  clear(): void {
    this.#renderer.setClearColor(new Color(0), 0);
    this.#renderer.clear();
  }

  dispose(): void {
    this.#map?.dispose();
    this.#geometry.dispose();
    for (const half of this.#halves) half.material.dispose();
    this.#renderer.dispose();
    this.canvas.remove();
  }
}

function fieldMaterial(): RawShaderMaterial {
  return new RawShaderMaterial({
    glslVersion: GLSL3,
    vertexShader: VERTEX,
    fragmentShader: FRAGMENT,
    side: DoubleSide,
    depthTest: false,
    depthWrite: false,
    uniforms: {
      map: { value: null },
      range: { value: [0, 1] },
      sheet: { value: [0, 0, 0] },
      veil: { value: 0 },
      ghost: { value: 0 },
    },
  });
}

type Rows = Parameters<Mesh["matrix"]["set"]>;

/** Row by row: from (r, z) to px on the board; sign -1 for the mirrored half. */
function placing(view: View, sign: 1 | -1): Rows {
  const s = view.scale;
  return view.lying
    ? [0, s, 0, view.x, -sign * s, 0, 0, view.y, 0, 0, 1, 0, 0, 0, 0, 1]
    : [sign * s, 0, 0, view.x, 0, -s, 0, view.y, 0, 0, 1, 0, 0, 0, 0, 1];
}
