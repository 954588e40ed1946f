import { emptyStep, type Geometry, rampColors, rampSteps, rasterizeCells } from '@nightcone/drawing';
import { useLayoutEffect, useRef } from 'react';
import { type Theme, useTheme } from '../lib/theme.ts';
import { readColor, readGround } from './role-colors.ts';

/** Heat maps always, lines and points from 5 000 marks on; device pixels, so that nothing blurs. */
export function PlotCanvas({
  geometry,
  marks,
  shift = null,
}: {
  geometry: Geometry;
  marks: boolean;
  /** The picture as it is, moved by so many px. */
  shift?: { x: number; y: number } | null;
}) {
  const ref = useRef<HTMLCanvasElement | null>(null);
  const theme = useTheme();
  useLayoutEffect(() => {
    const canvas = ref.current;
    const context = canvas?.getContext?.('2d');
    if (!canvas || !context) return;
    const ratio = window.devicePixelRatio || 1;
    canvas.width = Math.round(geometry.size.width * ratio);
    canvas.height = Math.round(geometry.size.height * ratio);
    drawCells(context, geometry, theme, ratio);
    context.setTransform(ratio, 0, 0, ratio, 0, 0);
    if (marks) drawMarks(context, geometry, canvas);
  }, [geometry, marks, theme]);
  return (
    <div aria-hidden="true" className={`pointer-events-none absolute inset-0 ${shift ? 'overflow-hidden' : ''}`}>
      <canvas
        ref={ref}
        style={{
          width: geometry.size.width,
          height: geometry.size.height,
          ...(shift ? { transform: `translate(${shift.x}px, ${shift.y}px)` } : {}),
        }}
      />
    </div>
  );
}

function drawCells(context: CanvasRenderingContext2D, geometry: Geometry, theme: Theme, ratio: number) {
  for (const { mark, box, bar } of geometry.cells) {
    const colors = rampColors(mark.scale, theme).map(channels);
    const width = Math.max(1, Math.round(box.width * ratio));
    const height = Math.max(1, Math.round(box.height * ratio));
    const steps = rasterizeCells(mark, geometry.domains.x, geometry.domains.y, width, height);
    const image = context.createImageData(width, height);
    for (let i = 0; i < steps.length; i++) {
      const step = steps[i] as number;
      if (step === emptyStep) continue;
      image.data.set(colors[step] as [number, number, number, number], 4 * i);
    }
    context.putImageData(image, Math.round(box.x * ratio), Math.round(box.y * ratio));
    const part = (bar.height * ratio) / rampSteps;
    for (let i = 0; i < rampSteps; i++) {
      context.fillStyle = rampColors(mark.scale, theme)[i] as string;
      context.fillRect(bar.x * ratio, (bar.y + bar.height) * ratio - (i + 1) * part, bar.width * ratio, part + 1);
    }
  }
}

const channels = (hex: string): [number, number, number, number] => [
  Number.parseInt(hex.slice(1, 3), 16),
  Number.parseInt(hex.slice(3, 5), 16),
  Number.parseInt(hex.slice(5, 7), 16),
  255,
];

function drawMarks(context: CanvasRenderingContext2D, geometry: Geometry, canvas: HTMLCanvasElement) {
  const { data } = geometry;
  context.save();
  context.beginPath();
  context.rect(data.x, data.y - 1, data.width, data.height + 2);
  context.clip();
  context.lineJoin = 'round';
  for (const line of geometry.lines) {
    context.strokeStyle = readColor(canvas, line.role);
    context.lineWidth = line.width;
    context.setLineDash(line.dash ? line.dash.split(' ').map(Number) : []);
    context.stroke(new Path2D(line.path));
  }
  context.setLineDash([]);
  for (const points of geometry.points) {
    const color = readColor(canvas, points.role);
    const r = points.radius;
    context.fillStyle = points.shape === 'dot' ? color : readGround(canvas);
    context.strokeStyle = color;
    context.lineWidth = 1.3;
    for (let i = 0; i < points.places.length; i += 2) {
      const [x, y] = [points.places[i] as number, points.places[i + 1] as number];
      context.beginPath();
      if (points.shape === 'cross' || points.shape === 'plus') {
        const d = points.shape === 'cross' ? r : 0;
        context.moveTo(x - r, y - d);
        context.lineTo(x + r, y + d);
        context.moveTo(x - d, y + r);
        context.lineTo(x + d, y - r);
        context.stroke();
      } else {
        context.arc(x, y, r, 0, 2 * Math.PI);
        context.fill();
        if (points.shape === 'open') context.stroke();
      }
    }
  }
  context.restore();
}
