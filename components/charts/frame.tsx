import type { ReactNode } from "react";

export interface ChartFrameProps {
  title: string;
  description?: string;
  viewBox: string;
  width?: number;
  height?: number;
  className?: string;
  /** The words stand beside it: hide the picture from those who have it read out. */
  decorative?: boolean | undefined;
  /** Let the picture fill its place, at the cost of its proportions. */
  stretch?: boolean;
  children: ReactNode;
}

/** The svg around every chart: an image with a name and a description. */
export function ChartFrame(props: ChartFrameProps) {
  const { title, description, viewBox, width, height, className = "", decorative } = props;
  return (
    <svg
      viewBox={viewBox}
      width={width}
      height={height}
      preserveAspectRatio={props.stretch ? "none" : undefined}
      className={`shrink-0 ${className}`}
      {...(decorative ? { "aria-hidden": true } : { role: "img" })}
    >
      {!decorative && <title>{title}</title>}
      {!decorative && description && <desc>{description}</desc>}
      {props.children}
    </svg>
  );
}
