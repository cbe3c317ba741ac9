/**
 * Where the attributes of the moving-together map stand. Those with ties are drawn together by their strength (springs, pairwise
 * pushed apart, boxes never overlapping); those without stand in rows below. No chance in it: the same ties give the same map.
 */
export interface MapBox {
  readonly key: string;
  readonly width: number;
  readonly x: number;
  readonly y: number;
}

export interface MapTie {
  readonly a: string;
  readonly b: string;
  /** 0 … 1 */
  readonly strength: number;
}

interface Moving {
  readonly key: string;
  readonly width: number;
  x: number;
  y: number;
}

export const BOX_HEIGHT = 22;
/** Room for the number of a tie between two boxes. */
const GAP_X = 44;
const GAP_Y = 26;
const ROUNDS = 260;

function startOnEllipse(boxes: readonly { key: string; width: number }[], width: number, height: number): Moving[] {
  return boxes.map((box, index) => {
    const turn = (2 * Math.PI * index) / boxes.length - Math.PI;
    return { ...box, x: width / 2 + 0.36 * width * Math.cos(turn), y: height / 2 + 0.36 * height * Math.sin(turn) };
  });
}

function pullTies(moving: readonly Moving[], ties: readonly MapTie[], heat: number): void {
  for (const tie of ties) {
    const a = moving.find((one) => one.key === tie.a);
    const b = moving.find((one) => one.key === tie.b);
    if (a === undefined || b === undefined) continue;
    const [dx, dy] = [b.x - a.x, b.y - a.y];
    const distance = Math.hypot(dx, dy) || 1;
    const wanted = 130 - 60 * tie.strength;
    const by = (heat * tie.strength * (distance - wanted)) / distance / 4;
    a.x += dx * by;
    a.y += dy * by;
    b.x -= dx * by;
    b.y -= dy * by;
  }
}

/** Pushes every two boxes apart while they are nearer than the gaps allow. */
function partBoxes(moving: readonly Moving[]): void {
  for (let i = 0; i < moving.length; i++) {
    for (let j = i + 1; j < moving.length; j++) {
      const [a, b] = [moving[i]!, moving[j]!];
      const overX = (a.width + b.width) / 2 + GAP_X - Math.abs(b.x - a.x);
      const overY = BOX_HEIGHT + GAP_Y - Math.abs(b.y - a.y);
      if (overX <= 0 || overY <= 0) continue;
      const side = (d: number): number => (d >= 0 ? 0.5 : -0.5);
      if (overY < overX) {
        const by = overY * side(b.y - a.y);
        a.y -= by;
        b.y += by;
      } else {
        const by = overX * side(b.x - a.x);
        a.x -= by;
        b.x += by;
      }
    }
  }
}

function keepInside(moving: readonly Moving[], width: number, height: number): void {
  for (const one of moving) {
    one.x = Math.min(width - one.width / 2 - 1, Math.max(one.width / 2 + 1, one.x));
    one.y = Math.min(height - BOX_HEIGHT / 2 - 1, Math.max(BOX_HEIGHT / 2 + 1, one.y));
  }
}

/** Boxes without a tie, in rows from `top`. */
function inRows(boxes: readonly { key: string; width: number }[], width: number, top: number): MapBox[] {
  let [x, y] = [0, top + BOX_HEIGHT / 2];
  return boxes.map((box) => {
    if (x > 0 && x + box.width > width) {
      x = 0;
      y += BOX_HEIGHT + 8;
    }
    const placed = { ...box, x: x + box.width / 2 + 1, y };
    x += box.width + 12;
    return placed;
  });
}

export function layoutMap(
  boxes: readonly { key: string; width: number }[],
  ties: readonly MapTie[],
  width: number,
): { boxes: readonly MapBox[]; height: number } {
  const isTied = (key: string): boolean => ties.some((tie) => tie.a === key || tie.b === key);
  const tied = boxes.filter((box) => isTied(box.key));
  const height = tied.length === 0 ? 0 : Math.max(70, 30 + 28 * tied.length);
  const moving = startOnEllipse(tied, width, height);
  for (let round = 0; round < ROUNDS; round++) {
    pullTies(moving, ties, 1 - round / ROUNDS);
    for (let again = 0; again < 3; again++) partBoxes(moving);
    keepInside(moving, width, height);
  }
  const rows = inRows(
    boxes.filter((box) => !isTied(box.key)),
    width,
    height === 0 ? 0 : height + 14,
  );
  const lowest = Math.max(height, ...rows.map((row) => row.y + BOX_HEIGHT / 2));
  return { boxes: [...moving, ...rows], height: lowest + 2 };
}
