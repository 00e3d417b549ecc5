/**
 * Finds the multipliers of the Hartmann and Wenzel (1995) waves, which are published with frequency and phase only:
 * the one vector of small integers whose frequency and whose phase at J2000 both agree.
 *
 * Their cosine form holds no (−1)^m; the form amplitude · W_n^m · {cos, n + m even; sin, n + m odd}(θ) with (−1)^m in
 * W turns a positive amplitude by 180° (m odd, cos), +90° (m odd, sin) or −90° (m even, sin).
 */
const DEGREE = 3;
// J2000.0, IERS Conventions (2010), eq. 5.43: degrees, and degrees per hour.
const PHASES = [242.14962, 218.31664563, 280.46645016, 83.35324312, -125.04455501, 282.93734098];
const RATES = [14.4920521205, 0.5490165197, 0.0410686399, 0.0046418134, 0.0022064069, 0.0000019615];
const DEGREES_PER_HOUR = (180 / Math.PI) * 3600;
const FREQUENCY_TOLERANCE = 3e-9; // degrees per hour
const PHASE_TOLERANCE = 2e-3; // degrees

const turned = (angle) => ((((angle + 180) % 360) + 360) % 360) - 180;

function* candidates(order) {
  for (let s = -7; s <= 7; s++)
    for (let h = -5; h <= 5; h++)
      for (let p = -4; p <= 4; p++)
        for (let n = -3; n <= 3; n++) for (let q = -1; q <= 1; q++) yield [order, s, h, p, n, q];
}

const dot = (numbers, values) => numbers.reduce((sum, n, i) => sum + n * values[i], 0);

/** Turn in degrees between the sine or cosine of the argument and the published cosine. */
function turnOf(order) {
  const cosine = (DEGREE + order) % 2 === 0;
  if (order % 2 === 1) return cosine ? 180 : 90;
  return cosine ? 0 : -90;
}

export function matchWaves(rows, gravity) {
  return rows.map((row) => {
    const order = Number(row.order_m);
    const speed = Number(row.freq_rad_s) * DEGREES_PER_HOUR;
    const phase = (Number(row.phase_rad) * 180) / Math.PI;
    const found = [];
    for (const numbers of candidates(order)) {
      if (Math.abs(dot(numbers, RATES) - speed) > FREQUENCY_TOLERANCE) continue;
      const off = turned(dot(numbers, PHASES) + turnOf(order) - phase);
      const sign = Math.abs(off) < 90 ? 1 : -1;
      if (Math.abs(turned(off + (sign < 0 ? 180 : 0))) < PHASE_TOLERANCE)
        found.push({ numbers, sign });
    }
    if (found.length !== 1) throw new Error(`wave ${row.index}: ${found.length} vectors fit`);
    return {
      numbers: found[0].numbers,
      amplitude: (found[0].sign * Number(row.amp_m2_s2)) / gravity,
    };
  });
}
