/** A section through an invented template with the formed sheet over it. On a small screen its left part is shown. */
export function SectionDrawing() {
  return (
    <figure className="border border-rule bg-sheet">
      <svg
        role="img"
        aria-label="Section through a template: hatched body, formed sheet over it, a wall with 9.5 degrees of draft, a foot where the sheet thins to 0.31 mm, and a vent of 0.6 mm."
        viewBox="0 0 900 290"
        preserveAspectRatio="xMinYMid slice"
        className="h-72 w-full fill-none"
      >
        <defs>
          <pattern
            id="section-hatch"
            width="9"
            height="9"
            patternUnits="userSpaceOnUse"
            patternTransform="rotate(45)"
          >
            <path d="M0 0v9" className="stroke-slate" strokeWidth="0.7" />
          </pattern>
        </defs>
        <path
          d="M52 236 74 202h34l21-114q2-8 10-8h128q8 0 10 8l18 98h42l14-50q2-7 9-7h168q7 0 9 7l14 50h48l16-70q2-7 9-7h92q7 0 9 7l24 86 14 34Z"
          fill="url(#section-hatch)"
          className="stroke-ink"
          strokeWidth="1.3"
        />
        <path
          d="M0 233.500h48.500l23-35.500h33l21.500-115q3-8 12-8h131q9 0 12 8l17.500 98h34.500l14-50q3-7 12-7h170q9 0 12 7l14 50h38l16-70q3-7 12-7h94q9 0 12 7l23.500 86 14 33.500H900"
          className="stroke-verdigris"
          strokeWidth="4.5"
          strokeLinejoin="round"
        />
        <path d="M0 236.500h900" className="stroke-ink" strokeWidth="1" />
        <path d="M314 186v50M318 186v50" className="stroke-ink" strokeWidth="0.8" />
        <g className="stroke-ink" strokeWidth="0.9">
          <path d="M122 118 150 40h74" />
          <path d="M316 214v36h20" />
          <path d="M129 248v24M277 248v24M129 262h148" />
        </g>
        <g className="stroke-madder" strokeWidth="0.9">
          <path d="M108 198 62 120H20" />
        </g>
        <g className="fill-ink font-mono" fontSize="12">
          <text x="154" y="34">
            draft 9.5°
          </text>
          <text x="342" y="254">
            vent 0.6
          </text>
          <text x="186" y="257" className="fill-ink">
            60.0
          </text>
          <text x="20" y="113" className="fill-madder">
            0.31 foot
          </text>
        </g>
      </svg>
      <figcaption className="border-t border-rule px-4 py-2 text-sm text-slate">
        A section through a template, with the sheet drawn ten times thicker. The figures are an example.
      </figcaption>
    </figure>
  );
}
