import { GUIDE_LINES, type Guides } from './guides.ts';

/** Draws guides over a picture: a hairline of white on a darker edge, seen on any picture and as thin at 100%. */
export function GuideLines({ guides }: { guides: Guides }) {
  if (guides === 'none') return null;
  return (
    <svg
      data-guides={guides}
      viewBox="0 0 100 100"
      preserveAspectRatio="none"
      aria-hidden="true"
      className="pointer-events-none absolute inset-0 size-full"
      shapeRendering={guides === 'diagonals' ? 'geometricPrecision' : 'crispEdges'}
    >
      <g stroke="#000" strokeOpacity="0.55" strokeWidth="3">
        <Lines guides={guides} />
      </g>
      <g stroke="#fff" strokeWidth="1">
        <Lines guides={guides} />
      </g>
    </svg>
  );
}

function Lines({ guides }: { guides: Guides }) {
  return GUIDE_LINES[guides].map(([x1, y1, x2, y2]) => (
    <line key={`${x1}/${y1}`} x1={x1} y1={y1} x2={x2} y2={y2} vectorEffect="non-scaling-stroke" />
  ));
}
