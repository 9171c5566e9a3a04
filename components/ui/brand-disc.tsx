/** The maker's mark: a disc on the wane. */
export function BrandDisc({ size = 24 }: { size?: number }) {
  return (
    <svg aria-hidden="true" width={size} height={size} viewBox="-12 -12 24 24">
      <circle r="11" className="fill-sheet stroke-spruce-line" strokeWidth="1.6" />
      <path d="M0-11A11 11 0 0 0 0 11A3.52 11 0 0 1 0-11Z" className="fill-spruce" />
    </svg>
  );
}
