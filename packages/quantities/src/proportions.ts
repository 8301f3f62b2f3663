const radians = (degrees: number) => (degrees * Math.PI) / 180;

/** Crown height in % of the mean girdle diameter from table % and crown angle (degrees). */
export function crownHeightPercent(table: number, crownAngle: number): number {
  return ((100 - table) / 2) * Math.tan(radians(crownAngle));
}

/** Pavilion depth in % of the mean girdle diameter from the pavilion angle (degrees) and culet %. */
export function pavilionDepthPercent(pavilionAngle: number, culet = 0): number {
  return ((100 - culet) / 2) * Math.tan(radians(pavilionAngle));
}

/** Pavilion angle in degrees from pavilion depth % and culet %. */
export function pavilionAngleOf(depth: number, culet = 0): number {
  return (Math.atan((2 * depth) / (100 - culet)) * 180) / Math.PI;
}

/** Depth in % from depth and the two measures in the same unit. */
export function depthPercent(a: number, b: number, depth: number): number {
  return (200 * depth) / (a + b);
}
