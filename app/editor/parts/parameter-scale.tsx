import type { PointerEventHandler } from "react";
import { type Scale, scaleTicks, shareOf } from "../model/scale.ts";

interface Props {
  readonly scale: Scale;
  readonly value: number;
  /** Where the outlined index stays; null: none. */
  readonly was: number | null;
  /** Where cells answer otherwise beyond. */
  readonly borders: readonly number[];
  readonly onPointerDown: PointerEventHandler<HTMLDivElement>;
  readonly onPointerMove: PointerEventHandler<HTMLDivElement>;
  readonly onPointerUp: PointerEventHandler<HTMLDivElement>;
  readonly onPointerCancel: PointerEventHandler<HTMLDivElement>;
}

/** The scale beneath a value, with its index ▼ and, where it was before, ▽. For the pointer; the value takes the keys. */
export function ParameterScale({ scale, value, was, borders, ...pointer }: Props) {
  const { fine, coarse } = scaleTicks(scale);
  return (
    <div className="hl-par-scale" {...pointer}>
      <svg width="100%" height="16" aria-hidden="true" overflow="visible">
        {fine.map((share) => (
          <Tick key={share} share={share} height={4} />
        ))}
        {coarse.map((share) => (
          <Tick key={share} share={share} height={8} />
        ))}
        {borders.map((at) =>
          at < scale.min || at > scale.max ? null : <Border key={at} share={shareOf(scale, at)} />,
        )}
        {was === null ? null : (
          <svg x={percent(shareOf(scale, was))} overflow="visible" aria-hidden="true">
            <path d="M-4 2l4 7 4-7z" fill="var(--paper)" stroke="var(--strand)" strokeWidth="1.2" />
          </svg>
        )}
        <svg x={percent(shareOf(scale, value))} overflow="visible" aria-hidden="true">
          <path d="M0 16V6" stroke="var(--strand)" strokeWidth="2" />
          <path d="M-5 1H5L0 9z" fill="var(--strand)" />
        </svg>
      </svg>
    </div>
  );
}

function Tick({ share, height }: { readonly share: number; readonly height: number }) {
  const x = percent(share);
  return <line x1={x} x2={x} y1={16} y2={16 - height} stroke="var(--edge)" strokeWidth="1" />;
}

/** A tick from the top of the scale to its foot, in ink. */
function Border({ share }: { readonly share: number }) {
  const x = percent(share);
  return <line className="hl-par-border" x1={x} x2={x} y1={0} y2={16} stroke="var(--ink)" strokeWidth="1" />;
}

function percent(share: number): string {
  return `${(share * 100).toFixed(3)}%`;
}
