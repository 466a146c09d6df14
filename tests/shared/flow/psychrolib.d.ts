/** The part of psychrolib 1.1.1 the comparison needs; the package brings no types. */
declare module 'psychrolib' {
  const library: {
    SI: number;
    SetUnitSystem(system: number): void;
    GetHumRatioFromRelHum(celsius: number, humidityRatio: number, pressureAbsPa: number): number;
    GetMoistAirDensity(celsius: number, waterRatio: number, pressureAbsPa: number): number;
  };
  export default library;
}
