import { aim, type Camera, type CameraSetting, mirrored, resized } from './camera.ts';
import { glare, vignette } from './glare.ts';
import type { Light } from './light.ts';
import type { Mesh } from './mesh.ts';
import type { MirrorPicture } from './mirror.ts';
import { inPerspective } from './project.ts';
import { Raster } from './raster.ts';
import { Shader } from './shade.ts';
import { ScreenSky } from './screen-sky.ts';
import { Skylight } from './skylight.ts';
import { type Lighting, lightingFor } from './view.ts';
import type { Vec3 } from './vector.ts';

/** What a picture is drawn from. */
export interface Subject {
  mesh: Mesh;
  camera: CameraSetting;
  light: Light;
  /** Height of the mirroring surface: harbour water, or streets wet from rain. */
  mirror: { level: number; wet: boolean } | null;
  seed: number;
}

/** A picture in linear light, three numbers a pixel; 1 is a surface that sends back full sunlight unscattered. */
export interface LinearPicture {
  width: number;
  height: number;
  light: Float32Array;
}

/** Rows of the picture that are worked on at a time, so that four samples a pixel fit into memory. */
const BAND = 128;

/** Draws a subject: four samples a pixel for what is seen, and as many shadings as there are surfaces among the four. */
export function render(subject: Subject, width: number, height: number): LinearPicture {
  const { mesh, light } = subject;
  const camera = aim(subject.camera, width, height);
  const lighting = lightingFor(mesh, camera, light, subject.seed);
  const mirror = subject.mirror ? renderMirror(subject, camera, lighting, subject.mirror.level) : null;
  const skylight = new Skylight(mesh, resized(camera, Math.round(width / 4)), lighting.patches, lighting.bounce);
  const shader = new Shader(mesh, camera, light, lighting, skylight, mirror, subject.mirror?.wet ?? false);
  const picture = { width, height, light: new Float32Array(width * height * 3) };
  const fine = resized(camera, width * 2);
  const outlines = inPerspective(mesh, fine);
  const raster = new Raster(width * 2, BAND * 2);
  const sky = new ScreenSky(camera, lighting.sky, 4);
  for (let row = 0; row < height; row += BAND) {
    raster.clear(0);
    raster.draw(outlines, row * 2);
    shadeBand(picture, raster, camera, shader, sky, row);
  }
  glare(picture);
  vignette(picture, camera);
  return picture;
}

const seenFaces = new Int32Array(4);
const seenCounts = new Int32Array(4);

function shadeBand(picture: LinearPicture, raster: Raster, camera: Camera, shader: Shader, sky: ScreenSky, firstRow: number): void {
  const { width } = picture;
  const rows = Math.min(BAND, picture.height - firstRow);
  const one = new Float64Array(3);
  const ray: [number, number, number] = [0.5, 0.5, 0.5];
  for (let y = 0; y < rows; y++) {
    for (let x = 0; x < width; x++) {
      const at = y * 2 * raster.width + x * 2;
      const kinds = distinct(raster, at);
      let r = 0;
      let g = 0;
      let b = 0;
      for (let k = 0; k < kinds; k++) {
        const face = seenFaces[k]!;
        const share = seenCounts[k]! / 4;
        if (face < 0) sky.at(x, firstRow + y, one);
        else {
          middle(raster, at, face, share);
          const px = place[0]!;
          const py = place[1]!;
          const near = place[2]!;
          towards(camera, x + px, firstRow + y + py, ray);
          shader.shade(face, x + px, firstRow + y + py, 1 / near, ray, one);
        }
        r += one[0]! * share;
        g += one[1]! * share;
        b += one[2]! * share;
      }
      const to = ((firstRow + y) * width + x) * 3;
      picture.light[to] = Math.max(0, r);
      picture.light[to + 1] = Math.max(0, g);
      picture.light[to + 2] = Math.max(0, b);
    }
  }
}

/** Counts the different faces among a pixel's four samples. */
function distinct(raster: Raster, at: number): number {
  const first = raster.face[at]!;
  const { width, face: faces } = raster;
  if (first === faces[at + 1] && first === faces[at + width] && first === faces[at + width + 1]) {
    seenFaces[0] = first;
    seenCounts[0] = 4;
    return 1;
  }
  let kinds = 0;
  for (let i = 0; i < 4; i++) {
    const face = raster.face[at + (i & 1) + (i >> 1) * raster.width]!;
    let k = 0;
    while (k < kinds && seenFaces[k] !== face) k++;
    if (k === kinds) {
      seenFaces[kinds] = face;
      seenCounts[kinds++] = 0;
    }
    seenCounts[k]!++;
  }
  return kinds;
}

const place = new Float64Array(3);

/** Mean place and nearness of the samples that show `face`, as offsets in pixels. */
function middle(raster: Raster, at: number, face: number, share: number): void {
  let px = 0;
  let py = 0;
  let near = 0;
  for (let i = 0; i < 4; i++) {
    const p = at + (i & 1) + (i >> 1) * raster.width;
    if (raster.face[p] !== face) continue;
    px += 0.25 + (i & 1) * 0.5;
    py += 0.25 + (i >> 1) * 0.5;
    near += raster.near[p]!;
  }
  const n = share * 4;
  place[0] = px / n;
  place[1] = py / n;
  place[2] = near / n;
}

function towards(camera: Camera, px: number, py: number, ray: [number, number, number]): void {
  const rx = (px - camera.centreX) / camera.focal;
  const ry = (camera.centreY - py) / camera.focal;
  const { right, up, forward } = camera;
  ray[0] = right[0] * rx + up[0] * ry + forward[0];
  ray[1] = right[1] * rx + up[1] * ry + forward[1];
  ray[2] = right[2] * rx + up[2] * ry + forward[2];
}

/** The upside-down picture, at half the size and one sample a pixel: waves break it up anyway. */
function renderMirror(subject: Subject, real: Camera, lighting: Lighting, level: number): MirrorPicture {
  const camera = mirrored(resized(real, real.width >> 1), level);
  const { mesh, light } = subject;
  const skylight = new Skylight(mesh, resized(camera, camera.width >> 2), lighting.patches, lighting.bounce, level);
  const shader = new Shader(mesh, camera, light, lighting, skylight, null, false, true);
  const raster = new Raster(camera.width, camera.height);
  raster.clear(0);
  // Wet streets lie at two heights, a kerb apart: what is lower than that mirrors nothing.
  raster.draw(inPerspective(mesh, camera, level + (subject.mirror?.wet ? 0.18 : 0.02)));
  const sky = new ScreenSky(camera, lighting.sky, 4);
  const picture = {
    camera,
    light: new Float32Array(camera.width * camera.height * 3),
    far: new Float32Array(camera.width * camera.height),
  };
  const one = new Float64Array(3);
  const ray: [number, number, number] = [0.5, 0.5, 0.5];
  for (let at = 0; at < raster.face.length; at++) {
    const x = at % camera.width;
    const y = (at / camera.width) | 0;
    const face = raster.face[at]!;
    if (face < 0) sky.at(x, y, one);
    else {
      const away = 1 / raster.near[at]!;
      towards(camera, x + 0.5, y + 0.5, ray);
      shader.shade(face, x + 0.5, y + 0.5, away, ray, one);
      picture.far[at] = away;
    }
    picture.light[at * 3] = one[0]!;
    picture.light[at * 3 + 1] = one[1]!;
    picture.light[at * 3 + 2] = one[2]!;
  }
  return picture;
}

export type { Vec3 };
