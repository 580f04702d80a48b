/** A straight scale from numbers to a stretch of a drawing. */
export function scale(from: readonly [number, number], to: readonly [number, number]): (value: number) => number {
  const span = from[1] - from[0];
  return (value) => (span === 0 ? (to[0] + to[1]) / 2 : to[0] + ((value - from[0]) / span) * (to[1] - to[0]));
}

/** Round numbers (1, 2 or 5 times a power of ten apart) inside a stretch, about `wanted` of them, with their decimals. */
export function ticks(low: number, high: number, wanted = 4): { values: number[]; decimals: number } {
  if (!(high > low)) return { values: [low], decimals: 0 };
  const rough = (high - low) / wanted;
  const power = 10 ** Math.floor(Math.log10(rough));
  const step = ([1, 2, 5, 10].find((factor) => factor * power >= rough) ?? 10) * power;
  const decimals = Math.max(0, -Math.floor(Math.log10(step) + 1e-9));
  const values: number[] = [];
  for (let n = Math.ceil(low / step - 1e-9); n * step <= high + step * 1e-9; n += 1) values.push(n * step);
  return { values, decimals };
}

/** A tick's label with a true minus, and never a negative zero. */
export function tickLabel(value: number, decimals: number): string {
  const text = value.toFixed(decimals);
  return (/[1-9]/.test(text) ? text : text.replace("-", "")).replace("-", "−");
}
