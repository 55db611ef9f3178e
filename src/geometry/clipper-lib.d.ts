/** The part of clipper-lib 6.4.2 that `clip.ts` uses; the package ships no types. */
declare module 'clipper-lib' {
  export interface IntPoint {
    X: number
    Y: number
  }
  export type Path = IntPoint[]
  export type Paths = Path[]

  export interface PolyNode {
    Contour(): Path
    Childs(): PolyNode[]
    IsHole(): boolean
  }

  interface ClipperInstance {
    PreserveCollinear: boolean
    AddPath(path: Path, type: number, closed: boolean): boolean
    AddPaths(paths: Paths, type: number, closed: boolean): boolean
    Execute(operation: number, solution: Paths | PolyNode, subjectFill: number, clipFill: number): boolean
  }
  interface OffsetInstance {
    AddPaths(paths: Paths, join: number, end: number): void
    Execute(solution: Paths, delta: number): void
  }

  const ClipperLib: {
    Error: (message: string) => void
    Clipper: {
      new (options?: number): ClipperInstance
      Minkowski(pattern: Path, path: Path, isSum: boolean, isClosed: boolean): Paths
      Area(path: Path): number
    }
    ClipperOffset: new (miterLimit?: number, arcTolerance?: number) => OffsetInstance
    PolyTree: new () => PolyNode
    Paths: new () => Paths
    PolyType: { ptSubject: number; ptClip: number }
    ClipType: { ctIntersection: number; ctUnion: number; ctDifference: number; ctXor: number }
    PolyFillType: { pftEvenOdd: number; pftNonZero: number }
    JoinType: { jtSquare: number; jtRound: number; jtMiter: number }
    EndType: { etClosedPolygon: number }
  }
  export default ClipperLib
}
