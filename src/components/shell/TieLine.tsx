'use client';

import { useEffect, useRef, type RefObject } from 'react';

/** Where the line climbs: inside the margin rule, left of the headings. */
const CLIMB_PX = 14;
const SQUARE_PX = 5;

interface Box {
  left: number;
  right: number;
  top: number;
  bottom: number;
}

export interface TiePlaces {
  figure: Box;
  /** The row the figure stands in; its lower rule is followed. */
  row: Box;
  heading: Box;
  /** The part of the main pane that is in view. */
  pane: Box;
  column: Box;
}

/**
 * The path of a tie: from the figure's foot along its row's lower rule, up inside the margin rule, to a square at the
 * heading. Of a figure that has scrolled away only the part from the pane's edge is left. All in one frame, px.
 */
export function tiePath({ figure, row, heading, pane, column }: TiePlaces): { line: string; square: [number, number] } {
  const climb = Math.round(column.left + CLIMB_PX) + 0.5;
  const foot = Math.round(row.bottom) - 0.5;
  const middle = Math.round((heading.top + heading.bottom) / 2) + 0.5;
  const square: [number, number] = [Math.round(heading.left) - SQUARE_PX, middle - SQUARE_PX / 2];
  const away = figure.bottom < pane.top || figure.bottom > pane.bottom;
  const from = away ? Math.round(pane.right) : Math.round((figure.left + figure.right) / 2);
  const along = Math.min(Math.max(foot, pane.top), pane.bottom);
  return { line: `M${from} ${along}H${climb}V${middle}H${square[0]}`, square };
}

/** Decoration: joins the open figure with the heading of its working. Drawn only where the column is beside the sheet. */
export function TieLine({ sheet }: { sheet: RefObject<HTMLElement | null> }) {
  const svg = useRef<SVGSVGElement>(null);

  useEffect(() => {
    const root = sheet.current;
    const drawing = svg.current;
    const line = drawing?.querySelector('path');
    const square = drawing?.querySelector('rect');
    if (!root || !drawing || !line || !square) return;
    let frame = 0;
    let drawnFor: Element | null = null;

    const draw = () => {
      frame = 0;
      const figure = root.querySelector('[data-tie="figure"]');
      const heading = root.querySelector('[data-tie="heading"]');
      const pane = root.querySelector('.sheet-main');
      const column = root.querySelector('.column');
      const shown = figure && heading && pane && column && pane.contains(figure);
      drawing.classList.toggle('tie-away', !shown);
      if (!shown) return void (drawnFor = null);
      const frameBox = root.getBoundingClientRect();
      const within = (element: Element): Box => {
        const box = element.getBoundingClientRect();
        const [x, y] = [frameBox.left + root.clientLeft, frameBox.top + root.clientTop];
        return { left: box.left - x, right: box.right - x, top: box.top - y, bottom: box.bottom - y };
      };
      const row = figure.closest('tr, [role="row"], [data-row]') ?? figure;
      const places = {
        figure: within(figure),
        row: within(row),
        heading: within(heading),
        pane: within(pane),
        column: within(column),
      };
      const tie = tiePath(places);
      line.setAttribute('d', tie.line);
      square.setAttribute('x', String(tie.square[0]));
      square.setAttribute('y', String(tie.square[1]));
      if (drawnFor !== figure) {
        drawnFor = figure;
        drawing.classList.remove('tie-drawn');
        void drawing.getBoundingClientRect();
        drawing.classList.add('tie-drawn');
      }
    };
    const soon = () => {
      frame ||= requestAnimationFrame(draw);
    };

    const changes = new MutationObserver((records) => {
      if (records.some(({ target }) => !drawing.contains(target))) soon();
    });
    changes.observe(root, { subtree: true, childList: true, attributeFilter: ['data-tie', 'data-open'] });
    const sizes = new ResizeObserver(soon);
    sizes.observe(root);
    root.addEventListener('scroll', soon, { capture: true, passive: true });
    soon();
    return () => {
      cancelAnimationFrame(frame);
      changes.disconnect();
      sizes.disconnect();
      root.removeEventListener('scroll', soon, { capture: true });
    };
  }, [sheet]);

  return (
    <svg ref={svg} className="tie tie-away" aria-hidden>
      <path pathLength="1" fill="none" stroke="currentColor" strokeWidth="1.5" />
      <rect width={SQUARE_PX} height={SQUARE_PX} fill="currentColor" />
    </svg>
  );
}
