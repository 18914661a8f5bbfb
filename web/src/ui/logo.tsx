/** An oriel seen from the street: three lights under a splayed roof, on its corbel. */
export function Logo({ size = 26 }: { size?: number }) {
  return (
    <svg width={size} height={size} viewBox="0 0 26 26" fill="none" stroke="currentColor" strokeWidth={1.6} aria-hidden="true">
      <path d="M4 20V9l4-5h10l4 5v11zM9 4v16M17 4v16M4 10h18M2 20h22M7 20l3 4h6l3-4" />
    </svg>
  );
}
