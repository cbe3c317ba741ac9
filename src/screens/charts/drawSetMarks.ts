/** The marks of the every-set strip on a canvas: one path for each family and state, so that tens of thousands stay smooth. */
import { familyOf, type SetMarks, type SetScale } from "./setScale.ts";

type Kind = "tick" | "shortTick" | "ring" | "cross";

const KINDS: readonly Kind[] = ["tick", "shortTick", "ring", "cross"];
/** Above so many marks they are drawn small. */
const CROWD = 4000;

export interface MarkColours {
  readonly defensible: string;
  readonly other: string;
}

export function drawSetMarks(
  canvas: HTMLCanvasElement,
  size: { readonly width: number; readonly height: number },
  marks: SetMarks,
  scale: SetScale,
  parting: readonly number[],
  limit: number,
  colours: MarkColours,
): void {
  const context = canvas.getContext("2d");
  if (context === null) return;
  const ratio = window.devicePixelRatio || 1;
  canvas.width = Math.round(size.width * ratio);
  canvas.height = Math.round(size.height * ratio);
  context.setTransform(ratio, 0, 0, ratio, 0, 0);
  context.clearRect(0, 0, size.width, size.height);
  const paths = markPaths(marks, scale, parting, limit);
  const isCrowd = marks.price.length > CROWD;
  context.lineWidth = isCrowd ? 0.8 : 1.3;
  for (const isIn of [false, true]) {
    context.strokeStyle = isIn ? colours.defensible : colours.other;
    context.globalAlpha = isCrowd && !isIn ? 0.45 : 1;
    for (const path of paths[isIn ? 1 : 0]!) context.stroke(path);
  }
}

function markPaths(
  { price, error }: SetMarks,
  { x, y }: SetScale,
  parting: readonly number[],
  limit: number,
): readonly (readonly Path2D[])[] {
  const paths = [KINDS.map(() => new Path2D()), KINDS.map(() => new Path2D())];
  const isCrowd = price.length > CROWD;
  price.forEach((amount, set) => {
    const err = error[set];
    if (amount === null || err === null || err === undefined) return;
    const family = familyOf(set, parting);
    addMark(paths[err <= limit ? 1 : 0]![family]!, KINDS[family]!, x(amount), y(err), isCrowd ? 0.6 : 1);
  });
  return paths;
}

function addMark(path: Path2D, kind: Kind, x: number, y: number, size: number): void {
  if (kind === "ring") {
    path.moveTo(x + 2.6 * size, y);
    path.arc(x, y, 2.6 * size, 0, 2 * Math.PI);
  } else if (kind === "cross") {
    const arm = 2.4 * size;
    path.moveTo(x - arm, y - arm);
    path.lineTo(x + arm, y + arm);
    path.moveTo(x - arm, y + arm);
    path.lineTo(x + arm, y - arm);
  } else {
    const half = (kind === "tick" ? 5 : 3.2) * size;
    path.moveTo(x, y - half);
    path.lineTo(x, y + half);
  }
}
