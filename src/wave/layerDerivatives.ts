/**
 * d/dq of a = sin(kw)/k (sinh(kw)/k for q < 0), that is (w c - a)/(2q), given c and a. Below |q w²| = 1 the two terms
 * cancel; there the series w³ (-1/6 + z/60 - z²/1680 + ...), z = q w², whose coefficients are (-1)^k k/(2k + 1)!.
 * `divided`: c and a are divided by 2^n as `layerFunctions` does for thick layers, so the series is too.
 */
export function slopeOfSine(q: number, w: number, c: number, a: number, divided: boolean): number {
  const z = q * w * w
  if (Math.abs(z) >= 1) return (w * c - a) / (2 * q)
  const series =
    -0.16666666666666666 +
    z *
      (0.016666666666666666 +
        z *
          (-0.0005952380952380953 +
            z *
              (1.1022927689594357e-5 +
                z *
                  (-1.252605419272086e-7 +
                    z *
                      (9.635426302092969e-10 +
                        z * (-5.353014612273871e-12 + z * (2.2491658034764165e-14 - z * 7.398571721961897e-17)))))))
  // n is 0 or 1 here, as kw < 1; `layerFunctions` rounds kw/ln 2, ties to even.
  const scale = divided && q < 0 && Math.sqrt(-q) * w * Math.LOG2E > 0.5 ? 0.5 : 1
  return w * w * w * series * scale
}
