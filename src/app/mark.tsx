/** Two boards and the fasteners through them. */
export function Mark({ size = 22 }: { size?: number }) {
  return (
    <svg aria-hidden width={size} height={size} viewBox="0 0 22 22">
      <rect
        x={0.6}
        y={4}
        width={20.8}
        height={6}
        fill="var(--timber)"
        stroke="var(--ink)"
        strokeWidth={1.2}
      />
      <rect
        x={0.6}
        y={12}
        width={20.8}
        height={6}
        fill="var(--timber2)"
        stroke="var(--ink)"
        strokeWidth={1.2}
      />
      <path d="M7 1.5v19M15 1.5v19" stroke="var(--ink)" strokeWidth={1.8} />
    </svg>
  );
}
