/** What the second method finds: plain figures in the contract's units. */

/** Where positions are sampled the second method may miss this much of the worst. */
export const SAMPLED = 2e-3;

export interface SecondPlace {
  value: number;
  x: number;
  combination: string | null;
}

export interface SecondSide {
  shearMax: number;
  shearMin: number;
  momentMax: number;
  momentMin: number;
  deflectionMax: number;
  deflectionMin: number;
}

export interface SecondStation {
  x: number;
  /** a hair before x, and a hair behind it */
  left: SecondSide;
  right: SecondSide;
}

export interface SecondInterface {
  id: string;
  rows: number;
  /** N a fastener, MPa of an adhesive, N/mm of a line */
  capacity: number;
  peakFlow: SecondPlace;
  requiredSpacing: number | null;
  zones: { from: number; to: number; spacing: number; perRow: number; utilisation: number }[];
  /** rows, times Σ length/spacing over the zones: what the schedule makes least */
  cost: number | null;
  /** the same for a demand that is higher by `SAMPLED`: between the two lies the least cost under a sampled train */
  costRaised: number | null;
  /** the largest flow within each gap between two events, with which any zones can be checked */
  demand: { from: number; to: number; flow: number }[];
  fasteners: { count: number; positions: number[]; forces: number[]; utilisation: number } | null;
  utilisation: number;
  status: 'ok' | 'over' | 'advice';
}

export interface SecondResult {
  /**
   * `exact`: agrees to rounding. `sampled`: a train moves on an indeterminate beam or on one ply, so that positions between
   * those tried may be a little worse.
   */
  accuracy: 'exact' | 'sampled';
  section: {
    EA: number;
    EI: number;
    centroid: number;
    I: number;
    massPerLength: number | null;
    depth: number;
    interfaces: {
      id: string;
      orientation: 'horizontal' | 'vertical';
      contact: number;
      connected: boolean;
      firstMoment: number | null;
      flowPerShear: number;
    }[];
  };
  reactions: {
    combination: string;
    support: string;
    max: number;
    min: number;
    momentMax: number;
    momentMin: number;
  }[];
  stations: SecondStation[];
  extremes: { shear: SecondPlace; moment: SecondPlace; deflection: SecondPlace };
  interfaces: SecondInterface[];
}
