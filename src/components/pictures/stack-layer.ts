/** One layer of an attachment, as it is drawn. */
export interface StackLayer {
  name: string;
  thicknessM: number | null;
  kind: 'part' | 'joint' | 'carrier' | 'wall' | 'gap';
}
