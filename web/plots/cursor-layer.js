// The canvas that lies over a plot: the frequency cursor, the runs that are pointed at, and the box that is being drawn. What
// moves with the pointer is drawn here alone, so that the plot under it need not be.

import { clipped, strokeCurve, write } from './plot-layers.js';

/** @typedef {import('./plot-chart.js').ChartPanel} ChartPanel */
/** @typedef {{panel: ChartPanel, frequencyHz: Float64Array, values: Float64Array, name: string, colour: string}} RaisedLine */
/** @typedef {{panel: ChartPanel, value: number, colour: string}} CursorDot */
/** A place on a panel that can be dragged. @typedef {{panel: 'upper' | 'lower', frequencyHz: number, value: number}} Handle */
/** @typedef {{left: number, right: number, top: number, bottom: number}} DrawnBox */
/** @typedef {{panels: ChartPanel[], atHz: number | null, cursorText: string, raised: RaisedLine[], dots: CursorDot[], handles: Handle[], box: DrawnBox | null, theme: import('./plot-theme.js').PlotTheme}} CursorScene */

/**
 * @param {HTMLCanvasElement} canvas @param {{width: number, height: number}} size in CSS pixels @param {number} pixelRatio
 * @param {CursorScene} scene
 */
export function paintCursorLayer(canvas, size, pixelRatio, { panels, atHz, cursorText, raised, dots, handles, box, theme }) {
  const [width, height] = [Math.round(size.width * pixelRatio), Math.round(size.height * pixelRatio)];
  if (canvas.width !== width || canvas.height !== height) {
    canvas.width = width;
    canvas.height = height;
    canvas.style.width = `${size.width}px`;
    canvas.style.height = `${size.height}px`;
  }

  const context = canvas.getContext('2d');
  if (context === null || panels.length === 0) return;
  context.setTransform(pixelRatio, 0, 0, pixelRatio, 0, 0);
  context.clearRect(0, 0, size.width, size.height);
  raised.forEach((line) => paintRaised(context, line, theme));
  if (atHz !== null) paintCursor(context, panels, atHz, cursorText, dots, theme);
  handles.forEach((handle) => paintHandle(context, panels, handle, theme));
  if (box !== null) paintBox(context, box, theme);
}

/** @param {CanvasRenderingContext2D} context @param {RaisedLine} line @param {import('./plot-theme.js').PlotTheme} theme */
function paintRaised(context, { panel, frequencyHz, values, name, colour }, theme) {
  const x = Float64Array.from(frequencyHz, panel.x);
  clipped(context, panel, () => {
    context.lineJoin = 'round';
    context.setLineDash([]);
    context.strokeStyle = theme.ground;
    context.lineWidth = 5.5;
    strokeCurve(context, x, values, panel);
    context.strokeStyle = colour;
    context.lineWidth = 2.5;
    strokeCurve(context, x, values, panel);
  });
  if (name === '') return;

  context.font = `600 ${theme.textPx}px ${theme.face}`;
  const half = context.measureText(name).width / 2 + 8;
  for (let i = x.length - 1; i >= 0; i--) {
    const y = panel.y(values[i]);
    if (x[i] > panel.right - half || x[i] < panel.left + half || !(y > panel.top + 4 && y < panel.bottom - 4)) continue;
    write(context, name, x[i], y < panel.top + 24 ? y + 13 : y - 13, colour, theme.ground);
    return;
  }
}

/**
 * @param {CanvasRenderingContext2D} context @param {ChartPanel[]} panels @param {number} atHz @param {string} text
 * @param {CursorDot[]} dots @param {import('./plot-theme.js').PlotTheme} theme
 */
function paintCursor(context, panels, atHz, text, dots, theme) {
  const [first] = panels;
  const x = first.x(atHz);
  if (x < first.left - 0.5 || x > first.right + 0.5) return;
  context.setLineDash([]);
  context.strokeStyle = theme.cursor;
  context.lineWidth = 1;
  context.beginPath();
  for (const { top, bottom } of panels) {
    context.moveTo(Math.round(x) + 0.5, top);
    context.lineTo(Math.round(x) + 0.5, bottom);
  }

  context.stroke();
  for (const { panel, value, colour } of dots) {
    const y = panel.y(value);
    if (!(y >= panel.top && y <= panel.bottom)) continue;
    context.beginPath();
    context.arc(x, y, 3.5, 0, 2 * Math.PI);
    context.fillStyle = colour;
    context.strokeStyle = theme.ground;
    context.lineWidth = 1.5;
    context.fill();
    context.stroke();
  }

  context.font = `600 ${theme.textPx}px ${theme.face}`;
  const half = context.measureText(text).width / 2 + 6;
  const middle = Math.min(first.right - half, Math.max(first.left + half, x));
  const bottom = Math.max(...panels.map((panel) => panel.bottom));
  const top = bottom + 4;
  context.fillStyle = theme.cursor;
  context.fillRect(middle - half, top, 2 * half, theme.textPx + 6);
  context.fillStyle = theme.ground;
  context.textAlign = 'center';
  context.textBaseline = 'middle';
  context.fillText(text, middle, top + (theme.textPx + 6) / 2 + 0.5);
}

/** @param {CanvasRenderingContext2D} context @param {ChartPanel[]} panels @param {Handle} handle @param {import('./plot-theme.js').PlotTheme} theme */
function paintHandle(context, panels, handle, theme) {
  const panel = panels.find(({ key }) => key === handle.panel);
  if (panel === undefined) return;
  clipped(context, panel, () => {
    context.fillStyle = theme.ground;
    context.strokeStyle = theme.forbidden;
    context.lineWidth = 2;
    context.setLineDash([]);
    context.beginPath();
    context.rect(panel.x(handle.frequencyHz) - 5, panel.y(handle.value) - 5, 10, 10);
    context.fill();
    context.stroke();
  });
}

/** @param {CanvasRenderingContext2D} context @param {DrawnBox} box @param {import('./plot-theme.js').PlotTheme} theme */
function paintBox(context, { left, right, top, bottom }, theme) {
  context.fillStyle = theme.cursor;
  context.globalAlpha = 0.12;
  context.fillRect(left, top, right - left, bottom - top);
  context.globalAlpha = 1;
  context.strokeStyle = theme.cursor;
  context.lineWidth = 1;
  context.setLineDash([4, 3]);
  context.strokeRect(Math.round(left) + 0.5, Math.round(top) + 0.5, right - left, bottom - top);
}
