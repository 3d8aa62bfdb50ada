/**
 * Turns degrees into radians. Degrees are what every exported kernel function takes; radians stay inside bodies.
 * @param angleDeg any finite angle, degrees
 * @returns the same angle in radians, same sign
 */
export function radiansFromDeg(angleDeg: number): number {
  return (angleDeg * Math.PI) / 180;
}

/**
 * Turns radians into degrees.
 * @param angleRad any finite angle, radians
 * @returns the same angle in degrees, same sign
 */
export function degFromRadians(angleRad: number): number {
  return (angleRad * 180) / Math.PI;
}
