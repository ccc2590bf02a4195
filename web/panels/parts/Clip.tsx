import type { ComponentChildren } from 'preact';
import type { PlotArea } from '../../draw/plotArea.ts';

/** Curves that may leave the frame are cut off at it. `id` is the figure's own. */
export function Clip({
  id,
  area,
  children,
  className,
}: {
  readonly id: string;
  readonly area: PlotArea;
  readonly children: ComponentChildren;
  readonly className?: string;
}) {
  const { left, right, top, bottom } = area;
  return (
    <>
      <clipPath id={id}>
        <rect x={left} y={top} width={right - left} height={bottom - top} />
      </clipPath>
      <g clip-path={`url(#${id})`} class={className}>
        {children}
      </g>
    </>
  );
}
