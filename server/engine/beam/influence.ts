import type { BeamSystem, SpanLoads } from './system';

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

/**
 * Influence lines of a beam, from four solutions a span: the state at the nodes is cubic in the load's place.
 * The cubics stand in flat tables, read four numbers at 4·(n·spans + e) for node n and a load in span e, so that
 * the lines of hundreds of places can be put together without solving anything again.
 */
export class Influence {
  readonly starts: Float64Array;
  readonly lengths: Float64Array;
  private readonly momentLeft: Float64Array;
  private readonly momentRight: Float64Array;
  private readonly deflection: Float64Array;
  /** ∫V from the left end to each node */
  private readonly integral: Float64Array;

  constructor(readonly system: BeamSystem) {
    const { spans, nodes } = system;
    this.starts = Float64Array.from(nodes, (n) => n.x);
    this.lengths = Float64Array.from({ length: spans }, (_, e) => system.spanLength(e));
    const size = 4 * spans * nodes.length;
    this.momentLeft = new Float64Array(size);
    this.momentRight = new Float64Array(size);
    this.deflection = new Float64Array(size);
    this.integral = new Float64Array(size);
    const nodeLoads = nodes.map(() => ({ force: 0, couple: 0 }));
    const still: SpanLoads = { shear: [0, 0], slope: [0, 0] };
    for (let e = 0; e < spans; e++) {
      const s = (this.lengths[e] ?? 0) ** 2 / 6;
      // Unit load at t: shear [1 − t, −t]; EI·slope ℓ²/6·[2t − 3t² + t³, −(t − t³)].
      const terms: SpanLoads[] = [
        { shear: [1, 0], slope: [0, 0] },
        { shear: [-1, -1], slope: [2 * s, -s] },
        { shear: [0, 0], slope: [-3 * s, 0] },
        { shear: [0, 0], slope: [s, s] },
      ];
      const loads = nodes.slice(1).map(() => still);
      terms.forEach((term, d) => {
        loads[e] = term;
        const state = system.solve(loads, nodeLoads);
        for (let n = 0; n < nodes.length; n++) {
          const at = 4 * (n * spans + e) + d;
          this.momentLeft[at] = state.momentLeft[n] ?? 0;
          this.momentRight[at] = state.momentRight[n] ?? 0;
          this.deflection[at] = state.deflection[n] ?? 0;
          if (n === 0) continue;
          const before = at - 4 * spans;
          this.integral[at] =
            (this.integral[before] ?? 0) + (this.momentLeft[at] ?? 0) - (this.momentRight[before] ?? 0);
        }
      });
    }
  }

  /** Adds weight × a node's cubics to a line of one cubic a span. */
  private addNode(target: Float64Array, table: Float64Array, n: number, weight: number): void {
    const { spans } = this.system;
    const from = 4 * n * spans;
    for (let i = 0; i < 4 * spans; i++) target[i] = (target[i] ?? 0) + weight * (table[from + i] ?? 0);
  }

  /** Adds weight × (M_b − M_a)/ℓ of span m: its shear from the moments at its ends. */
  private addChord(target: Float64Array, m: number, weight: number): void {
    const w = weight / (this.lengths[m] ?? 1);
    this.addNode(target, this.momentLeft, m + 1, w);
    this.addNode(target, this.momentRight, m, -w);
  }

  private empty(): Float64Array {
    return new Float64Array(4 * this.system.spans);
  }

  /** A line without kinks inside spans: one cubic a span. */
  private plain(cubic: Float64Array): InfluenceLine {
    const { spans } = this.system;
    const span = new Int32Array(spans);
    const first = new Int32Array(spans + 1);
    for (let e = 0; e <= spans; e++) {
      if (e < spans) span[e] = e;
      first[e] = e;
    }
    return { edges: this.starts, cubic, span, first, splits: [] };
  }

  /** A line that has, besides its cubics, terms that hold only left, or only right, of places inside spans. */
  private split(base: Float64Array, at: readonly OwnSpan[]): InfluenceLine {
    const splits: number[] = [];
    for (const { x, m } of at) {
      if (x > (this.starts[m] ?? 0) && x < (this.starts[m + 1] ?? 0) && !splits.includes(x)) splits.push(x);
    }
    if (splits.length > 1) splits.sort((a, b) => a - b);
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
    let next = 0;
    for (let e = 0; e < spans; e++) {
      line.first[e] = piece;
      let from = this.starts[e] ?? 0;
      const end = this.starts[e + 1] ?? 0;
      for (;;) {
        line.edges[piece] = from;
        line.span[piece] = e;
        const k = 4 * piece;
        for (let d = 0; d < 4; d++) line.cubic[k + d] = base[4 * e + d] ?? 0;
        for (const { x, m, left, right } of at) {
          if (m !== e) continue;
          const own = from < x ? left : right;
          for (let d = 0; d < 4; d++) line.cubic[k + d] = (line.cubic[k + d] ?? 0) + (own[d] ?? 0);
        }
        piece++;
        const cut = splits[next];
        if (cut === undefined || cut >= end) break;
        from = cut;
        next++;
      }
    }
    line.first[spans] = pieces;
    line.edges[pieces] = this.starts[spans] ?? 0;
    return line;
  }

  /** Upward reaction of the support at node n. */
  reaction(n: number): InfluenceLine {
    const cubic = this.empty();
    const node = this.system.nodes[n];
    if (node?.support?.kind === 'spring') {
      this.addNode(cubic, this.deflection, n, (node.support.stiffness ?? 0) / this.system.EI);
      return this.plain(cubic);
    }
    const { spans } = this.system;
    // The load's own share of its span, (1 − t) to the left node and t to the right, and the chords beside.
    if (n < spans) {
      this.addChord(cubic, n, 1);
      cubic[4 * n] = (cubic[4 * n] ?? 0) + 1;
      cubic[4 * n + 1] = (cubic[4 * n + 1] ?? 0) - 1;
    }
    if (n > 0) {
      this.addChord(cubic, n - 1, -1);
      cubic[4 * n - 3] = (cubic[4 * n - 3] ?? 0) + 1;
    }
    return this.plain(cubic);
  }

  /** Moment of the fixed support at node n. */
  supportMoment(n: number): InfluenceLine {
    const cubic = this.empty();
    this.addNode(cubic, this.momentRight, n, 1);
    this.addNode(cubic, this.momentLeft, n, -1);
    return this.plain(cubic);
  }

  /**
   * Shear within span m of a load left of the place looked at (`side` −1, spans up to m count) and of one
   * right of it (`side` 1, spans from m on count). Neither depends on the place itself.
   */
  spanShear(m: number, side: -1 | 1): InfluenceLine {
    const cubic = this.empty();
    this.addChord(cubic, m, 1);
    cubic[4 * m + 1] = (cubic[4 * m + 1] ?? 0) - 1;
    if (side === 1) cubic[4 * m] = (cubic[4 * m] ?? 0) + 1;
    return this.plain(cubic);
  }

  /** Shear at x, in span m. At the beam's right end, just inside it: an axle on the very end stands right of x. */
  shear(x: number, m: number): InfluenceLine {
    const cubic = this.empty();
    this.addChord(cubic, m, 1);
    const { spans } = this.system;
    const end = this.starts[spans] ?? 0;
    const inside = Math.min(x, end - 1e-10 * end);
    return this.split(cubic, [
      { x: m === spans - 1 ? inside : x, m, left: [0, -1, 0, 0], right: [1, -1, 0, 0] },
    ]);
  }

  /** M at x of the span's own simply supported beam: ℓ·t(1 − ξ) for a load left of x, ℓ·ξ(1 − t) right of it. */
  private ownMoment(x: number, m: number, sign: number): OwnSpan {
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
    const cubic = this.empty();
    this.addNode(cubic, this.momentRight, m, 1 - xi);
    this.addNode(cubic, this.momentLeft, m + 1, xi);
    return this.split(cubic, [this.ownMoment(x, m, 1)]);
  }

  /** Adds weight × ∫V from the left end of the beam to x, in span m, without the span's own part. */
  private addIntegral(target: Float64Array, x: number, m: number, weight: number): void {
    this.addNode(target, this.integral, m, weight);
    this.addChord(target, m, weight * (x - (this.starts[m] ?? 0)));
  }

  /** ∫V dx from a to b (mm): what a fastener's stretch collects for one newton. */
  shearIntegral(a: number, b: number): InfluenceLine {
    const spanOfA = this.system.spanAt(a);
    const spanOfB = this.system.spanAt(b);
    const cubic = this.empty();
    this.addIntegral(cubic, b, spanOfB, 1);
    this.addIntegral(cubic, a, spanOfA, -1);
    return this.split(cubic, [this.ownMoment(b, spanOfB, 1), this.ownMoment(a, spanOfA, -1)]);
  }

  /** EI times the deflection at x, in span m. */
  bend(x: number, m: number): InfluenceLine {
    const length = this.lengths[m] ?? 1;
    const xi = (x - (this.starts[m] ?? 0)) / length;
    const s = (length * length) / 6;
    const c = length ** 3 / 6;
    const r = 1 - xi;
    const cubic = this.empty();
    this.addNode(cubic, this.deflection, m, r);
    this.addNode(cubic, this.deflection, m + 1, xi);
    this.addNode(cubic, this.momentRight, m, s * (2 * xi - 3 * xi ** 2 + xi ** 3));
    this.addNode(cubic, this.momentLeft, m + 1, s * (xi - xi ** 3));
    return this.split(cubic, [
      {
        x,
        m,
        // ℓ³/6·t(1−ξ)(1 − (1−ξ)² − t²) for a load left of x, its mirror right of it:
        // ℓ³/6·(1−t)ξ(1 − (1−t)² − ξ²) = ℓ³/6·ξ·[(1−t)(1−ξ²) − (1−t)³]
        left: [0, c * r * (1 - r * r), 0, -c * r],
        right: [-c * xi * xi * xi, c * xi * (2 + xi * xi), -3 * c * xi, c * xi],
      },
    ]);
  }
}

/** What the loaded span itself adds at x: one cubic for loads left of x, one for loads right of it. */
interface OwnSpan {
  x: number;
  m: number;
  left: Cubic;
  right: Cubic;
}
