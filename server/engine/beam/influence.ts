import type { BeamSystem, NodeState } from './system';

/**
 * An influence line: what a unit load at a does to one quantity, a piecewise cubic in a (Müller-Breslau).
 * Piece i reaches from edges[i] to edges[i+1] and is a cubic in (a − origin)/length of the span it lies in.
 */
export interface InfluenceLine {
  edges: Float64Array;
  /** coefficients, four a piece, in the local coordinate of the piece's span */
  cubic: Float64Array;
  /** span of each piece */
  span: Int32Array;
  /** index of the first piece of each span, and the number of pieces at the end */
  first: Int32Array;
  /** places inside spans where the line has a kink or a jump */
  splits: readonly number[];
}

type Cubic = [number, number, number, number];

/** Influence lines of a beam, from four solutions a span: the state at the nodes is cubic in the load's place. */
export class Influence {
  readonly starts: Float64Array;
  readonly lengths: Float64Array;
  /** states[e][d]: coefficient of t^d of the node state for a unit load at t of span e */
  private readonly states: NodeState[][];
  /** cumulated ∫V from the left end to each node, as cubics: integral[e] has 4 numbers a node */
  private readonly integral: Float64Array[];

  constructor(readonly system: BeamSystem) {
    const { spans, nodes } = system;
    this.starts = Float64Array.from(nodes, (n) => n.x);
    this.lengths = Float64Array.from({ length: spans }, (_, e) => system.spanLength(e));
    this.states = [];
    this.integral = [];
    const none = { shear: [0, 0], slope: [0, 0] } as const;
    const nodeLoads = nodes.map(() => ({ force: 0, couple: 0 }));
    for (let e = 0; e < spans; e++) {
      const s = (this.lengths[e] ?? 0) ** 2 / 6;
      // Unit load at t: shear [1 − t, −t]; EI·slope ℓ²/6·[2t − 3t² + t³, −(t − t³)].
      const terms: { shear: [number, number]; slope: [number, number] }[] = [
        { shear: [1, 0], slope: [0, 0] },
        { shear: [-1, -1], slope: [2 * s, -s] },
        { shear: [0, 0], slope: [-3 * s, 0] },
        { shear: [0, 0], slope: [s, s] },
      ];
      const loads = nodes.slice(1).map(() => ({ shear: [...none.shear], slope: [...none.slope] }) as (typeof terms)[number]);
      this.states.push(
        terms.map((term) => {
          loads[e] = term;
          return system.solve(loads, nodeLoads);
        }),
      );
      const cumulated = new Float64Array(4 * nodes.length);
      for (let n = 1; n < nodes.length; n++) {
        for (let d = 0; d < 4; d++) {
          const state = this.states[e]?.[d];
          cumulated[4 * n + d] =
            (cumulated[4 * n - 4 + d] ?? 0) + (state?.momentLeft[n] ?? 0) - (state?.momentRight[n - 1] ?? 0);
        }
      }
      this.integral.push(cumulated);
    }
  }

  private cubic(e: number, of: (state: NodeState) => number): Cubic {
    const s = this.states[e] ?? [];
    const at = (d: number): number => {
      const state = s[d];
      return state ? of(state) : 0;
    };
    return [at(0), at(1), at(2), at(3)];
  }

  /** (M_b − M_a)/ℓ of span m: its shear from the moments at its ends. */
  private chord(e: number, m: number): Cubic {
    const length = this.lengths[m] ?? 1;
    return this.cubic(e, (s) => ((s.momentLeft[m + 1] ?? 0) - (s.momentRight[m] ?? 0)) / length);
  }

  /** A line without kinks inside spans: one cubic a span. */
  private plain(of: (e: number) => Cubic): InfluenceLine {
    const { spans } = this.system;
    const line: InfluenceLine = {
      edges: this.starts,
      cubic: new Float64Array(4 * spans),
      span: new Int32Array(spans),
      first: new Int32Array(spans + 1),
      splits: [],
    };
    for (let e = 0; e < spans; e++) {
      line.cubic.set(of(e), 4 * e);
      line.span[e] = e;
      line.first[e] = e;
    }
    line.first[spans] = spans;
    return line;
  }

  /** Adds to a plain line the terms that hold only left, or only right, of a place x in span m. */
  private split(base: InfluenceLine, at: { x: number; m: number; left: Cubic; right: Cubic }[]): InfluenceLine {
    const places = at.filter(({ x, m }) => x > (this.starts[m] ?? 0) && x < (this.starts[m + 1] ?? 0));
    const splits = [...new Set(places.map((p) => p.x))].sort((a, b) => a - b);
    const { spans } = this.system;
    const pieces = spans + splits.length;
    const line: InfluenceLine = {
      edges: new Float64Array(pieces + 1),
      cubic: new Float64Array(4 * pieces),
      span: new Int32Array(pieces),
      first: new Int32Array(spans + 1),
      splits,
    };
    let piece = 0;
    for (let e = 0; e < spans; e++) {
      line.first[e] = piece;
      const begin = this.starts[e] ?? 0;
      const end = this.starts[e + 1] ?? 0;
      const inner = splits.filter((x) => x > begin && x < end);
      for (const from of [begin, ...inner]) {
        line.edges[piece] = from;
        line.span[piece] = e;
        for (let d = 0; d < 4; d++) line.cubic[4 * piece + d] = base.cubic[4 * e + d] ?? 0;
        for (const { x, m, left, right } of at) {
          if (m !== e) continue;
          const own = from < x ? left : right;
          for (let d = 0; d < 4; d++) line.cubic[4 * piece + d] = (line.cubic[4 * piece + d] ?? 0) + (own[d] ?? 0);
        }
        piece++;
      }
    }
    line.first[spans] = pieces;
    line.edges[pieces] = this.starts[spans] ?? 0;
    return line;
  }

  /** Upward reaction of the support at node n. */
  reaction(n: number): InfluenceLine {
    const node = this.system.nodes[n];
    if (node?.support?.kind === 'spring') {
      const k = (node.support.stiffness ?? 0) / this.system.EI;
      return this.plain((e) => this.cubic(e, (s) => k * (s.deflection[n] ?? 0)));
    }
    return this.plain((e) => {
      const sum: Cubic = [0, 0, 0, 0];
      if (n < this.system.spans) this.chord(e, n).forEach((c, d) => (sum[d] = (sum[d] ?? 0) + c));
      if (n > 0) this.chord(e, n - 1).forEach((c, d) => (sum[d] = (sum[d] ?? 0) - c));
      // The load's own share of its span: (1 − t) to the left node, t to the right.
      if (e === n) {
        sum[0] += 1;
        sum[1] -= 1;
      }
      if (e === n - 1) sum[1] += 1;
      return sum;
    });
  }

  /** Moment of the fixed support at node n. */
  supportMoment(n: number): InfluenceLine {
    return this.plain((e) => this.cubic(e, (s) => (s.momentRight[n] ?? 0) - (s.momentLeft[n] ?? 0)));
  }

  /**
   * Shear within span m of a load left of the place looked at (`side` −1, spans up to m count) and of one
   * right of it (`side` 1, spans from m on count). Neither depends on the place itself.
   */
  spanShear(m: number, side: -1 | 1): InfluenceLine {
    return this.plain((e) => {
      const c = this.chord(e, m);
      if (e === m) {
        c[1] -= 1;
        if (side === 1) c[0] += 1;
      }
      return c;
    });
  }

  /** Shear at x, in span m. */
  shear(x: number, m: number): InfluenceLine {
    return this.split(
      this.plain((e) => this.chord(e, m)),
      [{ x, m, left: [0, -1, 0, 0], right: [1, -1, 0, 0] }],
    );
  }

  /** M at x of the span's own simply supported beam: ℓ·t(1 − ξ) for a load left of x, ℓ·ξ(1 − t) right of it. */
  private ownMoment(x: number, m: number, sign: number): { x: number; m: number; left: Cubic; right: Cubic } {
    const length = this.lengths[m] ?? 1;
    const xi = (x - (this.starts[m] ?? 0)) / length;
    return {
      x,
      m,
      left: [0, sign * length * (1 - xi), 0, 0],
      right: [sign * length * xi, -sign * length * xi, 0, 0],
    };
  }

  /** Moment at x, in span m. */
  moment(x: number, m: number): InfluenceLine {
    const xi = (x - (this.starts[m] ?? 0)) / (this.lengths[m] ?? 1);
    return this.split(
      this.plain((e) => this.cubic(e, (s) => (s.momentRight[m] ?? 0) * (1 - xi) + (s.momentLeft[m + 1] ?? 0) * xi)),
      [this.ownMoment(x, m, 1)],
    );
  }

  /** ∫V from the left end of the beam to x, in span m: the moment without its jumps. */
  private upTo(x: number, m: number): { base: (e: number) => Cubic; own: ReturnType<Influence['ownMoment']> } {
    const along = x - (this.starts[m] ?? 0);
    return {
      base: (e) => {
        const sums = this.integral[e] ?? new Float64Array(0);
        const c = this.chord(e, m);
        return [0, 1, 2, 3].map((d) => (sums[4 * m + d] ?? 0) + along * (c[d] ?? 0)) as Cubic;
      },
      own: this.ownMoment(x, m, 1),
    };
  }

  /** ∫V dx from a to b (mm): what a fastener's stretch collects for one newton. */
  shearIntegral(a: number, b: number): InfluenceLine {
    const spanOfA = this.system.spanAt(a);
    const spanOfB = this.system.spanAt(b);
    const low = this.upTo(a, spanOfA);
    const high = this.upTo(b, spanOfB);
    return this.split(
      this.plain((e) => {
        const p = high.base(e);
        const q = low.base(e);
        return [p[0] - q[0], p[1] - q[1], p[2] - q[2], p[3] - q[3]];
      }),
      [high.own, this.ownMoment(a, spanOfA, -1)],
    );
  }

  /** EI times the deflection at x, in span m. */
  bend(x: number, m: number): InfluenceLine {
    const length = this.lengths[m] ?? 1;
    const xi = (x - (this.starts[m] ?? 0)) / length;
    const s = length * length / 6;
    const fromLeft = s * (2 * xi - 3 * xi ** 2 + xi ** 3);
    const fromRight = s * (xi - xi ** 3);
    const c = length ** 3 / 6;
    const r = 1 - xi;
    return this.split(
      this.plain((e) =>
        this.cubic(
          e,
          (state) =>
            (state.deflection[m] ?? 0) * r +
            (state.deflection[m + 1] ?? 0) * xi +
            (state.momentRight[m] ?? 0) * fromLeft +
            (state.momentLeft[m + 1] ?? 0) * fromRight,
        ),
      ),
      [
        {
          x,
          m,
          // ℓ³/6·t(1−ξ)(1 − (1−ξ)² − t²) for a load left of x, its mirror right of it.
          left: [0, c * r * (1 - r * r), 0, -c * r],
          // ℓ³/6·(1−t)ξ(1 − (1−t)² − ξ²) = ℓ³/6·ξ·[(1−t)(1−ξ²) − (1−t)³]
          right: [-c * xi * xi * xi, c * xi * (2 + xi * xi), -3 * c * xi, c * xi],
        },
      ],
    );
  }
}
