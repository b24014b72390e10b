import { copperResistivity, leadConduction, leadGroundShare } from '../conduction/lead.js';
import type { NetworkBuilder } from './builder.js';
import type { ResolvedAssembly, ResolvedLead } from './resolved.js';

/** Film of a thin cable in still air, convection and radiation together, common practice [W/(m² K)]. */
const cableFilm = 15;
/** Diameter over the insulation ÷ that of the conductor, common practice. */
const insulatedRatio = 1.9;
/** Temperature at which a lead’s resistance is taken [°C]. */
const leadReferenceC = 60;

function currentOf(lead: ResolvedLead, assembly: ResolvedAssembly): number {
  const supply = assembly.document.supplies.find(({ id }) => id === lead.supply);
  return supply?.currentA ?? lead.currentA ?? 0;
}

/**
 * Leads from parts into the room: conduction inside, a fin outside, and their own I²R: inside half to each end, outside by the share
 * that reaches the wall. The current is that of the document: a drive ceiling varies the parts’, not a lead’s own heat, and says so.
 */
export function compileLeads(builder: NetworkBuilder, assembly: ResolvedAssembly): void {
  for (const lead of assembly.leads) {
    const exit = `lead.${lead.id}.exit`;
    const body = `part.${lead.part}.case`;
    const current = currentOf(lead, assembly);
    const conductor = Math.sqrt((4 * lead.crossSectionM2) / Math.PI);
    const diameter = lead.outerDiameterM ?? insulatedRatio * conductor;
    const ohmPerM = copperResistivity(leadReferenceC) / lead.crossSectionM2;
    builder.node(exit, 'spot', `${lead.label}, at the wall`);
    const outside = leadConduction({
      crossSection: lead.crossSectionM2,
      diameter,
      length: lead.outsideM,
      filmCoefficient: cableFilm,
    });
    builder.resistance(
      `lead.${lead.id}.inside`,
      body,
      exit,
      lead.insideM / (outside.conductivity * lead.crossSectionM2 * lead.count),
    );
    const conductance = outside.conductance * lead.count;
    if (conductance > 0) builder.resistance(`lead.${lead.id}.outside`, exit, 'ambient', 1 / conductance);
    const inside = lead.count * current * current * ohmPerM * lead.insideM;
    const beyond = lead.count * current * current * ohmPerM * lead.outsideM;
    if (inside > 0) builder.addHeat(body, inside / 2);
    if (inside + beyond > 0) builder.addHeat(exit, inside / 2 + beyond * leadGroundShare(outside.slenderness));
    if (lead.insulationMaxC === null) continue;
    // A long lead carrying current is warmer than the room by what its own surface needs; here the end at the wall is checked.
    builder.limit(
      { id: `lead.${lead.id}.insulation`, node: exit, maxC: lead.insulationMaxC },
      {
        group: `lead.${lead.id}.insulation`,
        label: `${lead.label}, insulation`,
        kind: 'temperature',
        unit: '°C',
        askedMargin: 0,
        basis: {
          reason: `Insulation rated for ${String(lead.insulationMaxC)} °C`,
          source: 'entered in the assembly',
          standing: 'data-sheet',
        },
      },
    );
  }
}
