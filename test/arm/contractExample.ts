/** The example of the arm file contract, word for word. It names a bearing `6003-like` that its table lacks. */
export const CONTRACT_EXAMPLE = `{
  "armload": 1,
  "name": "Glasshouse picking arm",
  "note": "optional free text",
  "gravity_m_s2": [0, 0, -9.80665],
  "joints": [
    {
      "name": "slew",
      "kind": "revolute",
      "origin_mm": [0, 0, 140],
      "turn_deg": [0, 0, 0],
      "axis": [0, 0, 1],
      "travel_deg": [-170, 170],
      "link": {
        "name": "turret",
        "mass_kg": 6.2,
        "centre_mm": [0, 40, 90],
        "inertia_kg_m2": { "xx": 0.05, "yy": 0.04, "zz": 0.03, "xy": 0, "xz": 0, "yz": 0 }
      },
      "support": {
        "arrangement": "cantilever",
        "hub_mm": 0,
        "span_mm": 70,
        "overhang_mm": 35,
        "side": "-",
        "thrust": "A",
        "bearings": { "A": "6004-like", "B": "6003-like" },
        "shaft": { "diameter_mm": 20, "bore_mm": 8, "material": "steel-c45", "turns_with": "link" }
      },
      "drive": { "kind": "gear", "station_mm": -20, "radius_mm": 30, "pressure_angle_deg": 20, "mesh_deg": 90 }
    }
  ],
  "tip": { "origin_mm": [0, 0, 90], "turn_deg": [0, 0, 0] },
  "cases": [
    { "name": "carry", "payload": { "mass_kg": 5, "centre_mm": [0, 0, 60] }, "factor": 1 },
    { "name": "press", "tip_force": { "force_N": 60, "direction": "any" } },
    { "name": "press down", "tip_force": { "force_N": 60, "direction": { "base": [0, 0, -1] } } },
    { "name": "stop", "motion": { "speed_deg_s": [90], "accel_deg_s2": [400] } }
  ],
  "bearings": {
    "6004-like": { "kind": "deep-groove", "bore_mm": 20, "outer_mm": 42, "width_mm": 12, "C_N": 9400, "C0_N": 5000 }
  },
  "targets": { "static_safety": 1.5, "life_h": 20000 }
}`;
