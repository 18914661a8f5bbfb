export interface Size {
  width: number;
  height: number;
}

export interface Point {
  x: number;
  y: number;
}

/** How a picture lies on the stage: `scale` 1 fits it in; x and y move its middle from the stage's middle, in CSS pixels. */
export interface StageView extends Point {
  scale: number;
}

export const FITTED: StageView = { scale: 1, x: 0, y: 0 };

/** The size at which a picture fits into the stage, never above its own pixels on this screen. */
export function fitInto(picture: Size, stage: Size, devicePixels = 1): Size {
  if (picture.width <= 0 || picture.height <= 0) return { width: 0, height: 0 };
  const scale = Math.min(stage.width / picture.width, stage.height / picture.height, 1 / devicePixels);
  return { width: picture.width * scale, height: picture.height * scale };
}

/** The scale at which one pixel of the picture is one pixel of the screen; 1 where the fitted picture is that large already. */
export function fullScale(picture: Size, fitted: Size, devicePixels: number): number {
  return fitted.width > 0 ? Math.max(1, picture.width / devicePixels / fitted.width) : 1;
}

function within(value: number, most: number): number {
  return Math.min(most, Math.max(-most, value));
}

/** Keeps the scale between fitted and full, and the picture from leaving the stage: an edge never comes further in than the stage's. */
export function keepOnStage(view: StageView, fitted: Size, stage: Size, most: number): StageView {
  const scale = Math.min(Math.max(view.scale, 1), most);
  const roomX = Math.max(0, (fitted.width * scale - stage.width) / 2);
  const roomY = Math.max(0, (fitted.height * scale - stage.height) / 2);
  return { scale, x: within(view.x, roomX), y: within(view.y, roomY) };
}

/** Changes the scale so that what lies under `point` (measured from the stage's middle) stays under it. */
export function scaleAt(view: StageView, scale: number, point: Point): StageView {
  const ratio = scale / view.scale;
  return { scale, x: point.x - (point.x - view.x) * ratio, y: point.y - (point.y - view.y) * ratio };
}

/** Two fingers: their spread changes the scale, their middle carries the picture along. */
export function pinch(start: StageView, before: [Point, Point], now: [Point, Point]): StageView {
  const middle = ([one, other]: [Point, Point]) => ({ x: (one.x + other.x) / 2, y: (one.y + other.y) / 2 });
  const spread = ([one, other]: [Point, Point]) => Math.max(1, Math.hypot(one.x - other.x, one.y - other.y));
  const from = middle(before);
  const to = middle(now);
  const scaled = scaleAt(start, start.scale * (spread(now) / spread(before)), from);
  return { ...scaled, x: scaled.x + to.x - from.x, y: scaled.y + to.y - from.y };
}

/** What a finger's way across the fitted picture means: far enough and more across than down. */
export function swipeOf(way: Point, stageWidth: number): 'next' | 'previous' | null {
  const enough = Math.min(80, stageWidth * 0.18);
  if (Math.abs(way.x) < enough || Math.abs(way.x) < Math.abs(way.y) * 1.4) return null;
  return way.x < 0 ? 'next' : 'previous';
}
