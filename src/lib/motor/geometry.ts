/**
 * What about a motor makes sound events: each count is that of one turn of the shaft that is asked for,
 * a positive integer, or null when the motor has no such part or nobody counted it.
 */
export interface MotorGeometry {
  /** Brush sites evenly around the commutator, which is the number of stator poles when every pole has a brush. */
  readonly poles: number | null;
  /** Commutator segments. */
  readonly segments: number | null;
  /** Fan or propeller blades. */
  readonly blades: number | null;
  /** Teeth of the gear on this shaft. */
  readonly teeth: number | null;
  /** Rotor magnets of a brushless motor: two make one pole pair. */
  readonly magnets: number | null;
}
