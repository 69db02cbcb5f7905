import type { AxisRecord } from '../../db/queries/axes';
import type { StoredPlant } from '../../db/schema';

/** A stored plant in the API's names. */
export function plantAnswer({ num, den, deadTimeS, text }: StoredPlant) {
  return { num, den, delay: deadTimeS, text };
}

export function axisAnswer(axis: AxisRecord) {
  const {
    id,
    tag,
    name,
    measurementUnit,
    outputUnit,
    convention,
    requirement,
    deviceLabel,
    lastVersion,
    rowVersion,
  } = axis;
  return {
    id,
    tag,
    name,
    machine: { id: axis.machine.id, site: axis.machine.site, name: axis.machine.name },
    measurementUnit,
    outputUnit,
    actuator: { low: axis.actuatorLow, high: axis.actuatorHigh, slew: axis.actuatorSlew },
    sampleTime: axis.sampleTimeS,
    convention,
    requirement,
    deviceLabel,
    loadCases: axis.loadCases.map(({ name: caseName, plant }) => ({
      name: caseName,
      plant: plant && plantAnswer(plant),
    })),
    inService: axis.inService && { version: axis.inService.version, since: axis.inService.since },
    lastVersion,
    rowVersion,
  };
}
