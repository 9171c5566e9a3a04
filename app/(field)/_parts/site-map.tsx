import type { DayPack, DaySite } from "@/lib/sync/day-pack";

const WIDTH = 360;
const HEIGHT = 150;

/** Where the site lies among the day's others, and the way to the phone's own map. */
export function SiteMap({ day, site }: { day: DayPack; site: DaySite }) {
  const narrow = Math.cos((site.latitude * Math.PI) / 180);
  const near = day.sites.map((other) => ({
    id: other.id,
    x: (other.longitude - site.longitude) * narrow,
    y: site.latitude - other.latitude,
  }));
  const reach = Math.max(0.005, ...near.map((p) => Math.max(Math.abs(p.x) / 2.2, Math.abs(p.y))));
  const scale = (HEIGHT / 2 - 16) / reach;
  return (
    <a
      href={`geo:${site.latitude},${site.longitude}?q=${site.latitude},${site.longitude}`}
      className="flex min-h-12 flex-col gap-1"
    >
      <svg
        viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
        className="w-full border border-rule bg-land"
        aria-hidden="true"
      >
        {near.map((p) => (
          <circle
            key={p.id}
            cx={WIDTH / 2 + p.x * scale}
            cy={HEIGHT / 2 + p.y * scale}
            r={p.id === site.id ? 9 : 4}
            className={p.id === site.id ? "fill-brick stroke-paper" : "fill-dusk"}
            strokeWidth="2"
          />
        ))}
      </svg>
      <span className="textlink">
        Open the map at {site.latitude.toFixed(5)}, {site.longitude.toFixed(5)}
      </span>
    </a>
  );
}
