/** Gamma density with shape k + 1 and rate S, at x: the posterior after k detections. */
function density(x: number, detections: number, exposure: number): number {
  if (x <= 0) return 0;
  let logGamma = 0;
  for (let i = 2; i <= detections; i++) logGamma += Math.log(i);
  return Math.exp(
    (detections + 1) * Math.log(exposure) + detections * Math.log(x) - exposure * x - logGamma,
  );
}

const WIDTH = 800;
const BASE = 560;
const SCALE = 340;
const HIGHEST_RATE = 0.105;
const samples = [38, 43, 48, 54, 60, 66, 73, 81, 90, 100, 112, 128];

function pathOf(exposure: number, highest: number): string {
  const points: string[] = [];
  for (let i = 0; i <= 160; i++) {
    const x = (i / 160) * HIGHEST_RATE;
    const y = BASE - (SCALE * density(x, 2, exposure)) / highest;
    points.push(`${((x / HIGHEST_RATE) * WIDTH).toFixed(1)} ${y.toFixed(1)}`);
  }
  return `M${points.join('L')}`;
}

/** The rate below which 95 % of a gamma law of shape 3 lies, by bisection of its closed form. */
function limitOf(exposure: number): number {
  const below = (x: number) => {
    const s = exposure * x;
    return 1 - Math.exp(-s) * (1 + s + (s * s) / 2);
  };
  let low = 0;
  let high = 1;
  for (let i = 0; i < 60; i++) {
    const middle = (low + high) / 2;
    if (below(middle) < 0.95) low = middle;
    else high = middle;
  }
  return low;
}

/** Posteriors of growing samples with two detections each, and the limit of the largest. */
export function SampleGrowthArt() {
  const last = samples[samples.length - 1];
  const highest = density(2 / last, 2, last);
  const limit = (limitOf(last) / HIGHEST_RATE) * WIDTH;
  const beyond = 1.18 * limitOf(last);
  const whole = pathOf(last, highest);
  return (
    <aside className="relative hidden flex-col justify-end bg-plate text-p-ink lg:flex">
      <svg
        viewBox={`0 0 ${WIDTH} 590`}
        className="w-full"
        role="img"
        aria-label="Posteriors of the host fraction narrow as the sample grows; a bar marks the 95 per cent limit of the largest."
      >
        <path
          d={`${whole}L${WIDTH} ${BASE}L0 ${BASE}Z`}
          fill="var(--p-data)"
          opacity="0.2"
          clipPath="url(#below-the-bound)"
        />
        <clipPath id="below-the-bound">
          <rect x="0" y="0" width={limit} height={BASE} />
        </clipPath>
        {samples.slice(0, -1).map((exposure, i) => (
          <path
            key={exposure}
            d={pathOf(exposure, highest)}
            fill="none"
            stroke="var(--p-data)"
            strokeWidth="1.2"
            opacity={0.25 + 0.05 * i}
          />
        ))}
        <path d={whole} fill="none" stroke="var(--p-data)" strokeWidth="2.6" />
        <path d={`M0 ${BASE}H${WIDTH}`} stroke="var(--p-ink3)" />
        {Array.from({ length: 11 }, (_, i) => (
          <path
            // biome-ignore lint/suspicious/noArrayIndexKey: the ticks never change their order
            key={i}
            d={`M${(i * WIDTH) / 10} ${BASE}v${i % 5 === 0 ? 11 : 6}`}
            stroke="var(--p-ink3)"
          />
        ))}
        <rect x={limit - 2.5} y={BASE - 330} width="5" height="330" fill="var(--p-bound)" />
        <circle
          cx={(beyond / HIGHEST_RATE) * WIDTH}
          cy={BASE - (SCALE * density(beyond, 2, last)) / highest}
          r="9"
          fill="var(--p-ink)"
          stroke="var(--plate)"
          strokeWidth="5"
        />
      </svg>
      <div className="px-14 pt-10 pb-16">
        <p className="font-light text-[24px] leading-tight">
          Each curve adds stars. The bound moves in.
        </p>
        <p className="mt-1 text-[14px] text-p-ink3">
          Posterior of the host fraction for growing samples; the bar marks the 95 % limit of the
          largest.
        </p>
      </div>
    </aside>
  );
}
