const radians = (degrees: number) => (degrees * Math.PI) / 180;
const degrees = (angle: number) => (angle * 180) / Math.PI;

/** Crown height in % of the mean girdle diameter from table % and crown angle (degrees). */
export function crownHeightPercent(table: number, crownAngle: number): number {
  return ((100 - table) / 2) * Math.tan(radians(crownAngle));
}

/** Pavilion depth in % of the mean girdle diameter from the pavilion angle (degrees) and culet %. */
export function pavilionDepthPercent(pavilionAngle: number, culet = 0): number {
  return ((100 - culet) / 2) * Math.tan(radians(pavilionAngle));
}

/** Crown angle in degrees from crown height % and table %. */
export function crownAngleOf(height: number, table: number): number {
  return degrees(Math.atan((2 * height) / (100 - table)));
}

/** Pavilion angle in degrees from pavilion depth % and culet %. */
export function pavilionAngleOf(depth: number, culet = 0): number {
  return degrees(Math.atan((2 * depth) / (100 - culet)));
}

/** What a round's depth % follows from: crown height + girdle + pavilion depth. */
export interface RoundProportions {
  table: number;
  crownAngle: number;
  pavilionAngle: number;
  girdle: number;
  culet?: number | undefined;
}

/** Total depth in % of a symmetric round brilliant; angles in degrees, the rest in %. */
export function totalDepthPercent(round: RoundProportions): number {
  const { table, crownAngle, pavilionAngle, girdle, culet = 0 } = round;
  return (
    crownHeightPercent(table, crownAngle) + girdle + pavilionDepthPercent(pavilionAngle, culet)
  );
}

/** Depth in % of the mean diameter: 2 z / (x + y), measures in one unit. */
export function depthPercent(a: number, b: number, depth: number): number {
  return (200 * depth) / (a + b);
}

/** Depth in % of the width, as it is said of fancy shapes (from memory). */
export function depthOfWidthPercent(a: number, b: number, depth: number): number {
  return (100 * depth) / Math.min(a, b);
}
