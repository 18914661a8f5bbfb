/**
 * One point of a surface while it is being shaded: where it lies, from where it is seen, and what was found there.
 * One object is filled again and again, because millions of points allocate nothing that way.
 */
export class Spot {
  /** Metres from the left and lower edge of the face, and the face's size. */
  u = 0.5;
  v = 0.5;
  uLength = 0.5;
  vLength = 0.5;
  seed = 1;
  /** The ray of sight and the way to the sun in the face's own axes; n points out of the face. */
  rayU = 0.5;
  rayV = 0.5;
  rayN = -0.5;
  sunU = 0.5;
  sunV = 0.5;
  sunN = 0.5;
  /** What one pixel covers of the face, in metres. */
  footU = 0.5;
  footV = 0.5;
  /** Share of rooms in use at this hour. */
  rooms = 0.5;

  /** Reflectance. */
  r = 0.5;
  g = 0.5;
  b = 0.5;
  /** Light of its own. */
  glowR = 0.5;
  glowG = 0.5;
  glowB = 0.5;
  /** Share of the point that is glass, and what glass reflects straight on; `pane` numbers the pane. */
  glass = 0.5;
  mirror = 0.5;
  pane = 1;
  /** Shares of sun and skylight that reach into a recess. */
  sun = 0.5;
  sky = 0.5;

  /** Starts a point over with a plain reflectance. */
  begin(r: number, g: number, b: number): void {
    this.r = r;
    this.g = g;
    this.b = b;
    this.glowR = 0;
    this.glowG = 0;
    this.glowB = 0;
    this.glass = 0;
    this.mirror = 0.05;
    this.sun = 1;
    this.sky = 1;
  }

  /** Makes the point lighter or darker; nothing is darker than black. */
  tone(factor: number): void {
    const k = factor > 0 ? factor : 0;
    this.r *= k;
    this.g *= k;
    this.b *= k;
  }
}
