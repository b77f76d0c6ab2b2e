/** The settling drawn under the sign-in page: start height, level and time constant in px. */
const startY = 14;
const levelY = 150;
const tauX = 132;

/** An exponential from the gauge to its level; it never overshoots. Four pixels a step. */
export function settlingTrace(width: number): string {
  const points = Array.from({ length: Math.ceil(width / 4) + 1 }, (_, index) => {
    const x = index * 4;
    const y = levelY - (levelY - startY) * Math.exp(-x / tauX);
    return `${index === 0 ? 'M' : 'L'}${x} ${Math.round(y * 10) / 10}`;
  });
  return points.join('');
}

export const waterLevelY = levelY;

/** Marks of the gauge: every 20 px, each fifth longer. */
export function gaugeMarks(height: number): readonly { y: number; length: number }[] {
  const count = Math.floor((height - startY) / 20) + 1;
  return Array.from({ length: count }, (_, index) => ({
    y: startY + index * 20,
    length: index % 5 === 0 ? 12 : 7,
  }));
}
