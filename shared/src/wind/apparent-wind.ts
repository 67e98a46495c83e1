/** Wind by speed and angle from the bow. */
export interface Wind {
  /** Any unit of speed, the same for boat and wind. */
  speed: number;
  /** Radians from the bow, 0 to pi; the side is kept by the sign. */
  angleRad: number;
}

/**
 * Apparent wind from true wind and boat speed, without leeway and heel.
 *
 * @param trueWind speed and angle from the bow
 * @param boatSpeed through the water, same unit
 */
export function apparentWind(trueWind: Wind, boatSpeed: number): Wind {
  return fromComponents(
    trueWind.speed * Math.cos(trueWind.angleRad) + boatSpeed,
    trueWind.speed * Math.sin(trueWind.angleRad),
  );
}

/** True wind from apparent wind and boat speed, the inverse of {@link apparentWind}. */
export function trueWind(apparent: Wind, boatSpeed: number): Wind {
  return fromComponents(
    apparent.speed * Math.cos(apparent.angleRad) - boatSpeed,
    apparent.speed * Math.sin(apparent.angleRad),
  );
}

function fromComponents(ahead: number, abeam: number): Wind {
  return { speed: Math.hypot(ahead, abeam), angleRad: Math.atan2(abeam, ahead) };
}
