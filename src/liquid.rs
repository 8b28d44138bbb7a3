//! The liquid: what statics needs to know of it.

/// A liquid at its service temperature. All values SI.
#[derive(Clone, Debug, PartialEq)]
pub struct Liquid {
    /// As shown.
    pub name: String,
    /// Density rho, kg/m3; above zero.
    pub density_kg_per_m3: f64,
    /// Vapour pressure, Pa absolute, where the user gives one.
    pub vapour_pressure_abs_pa: Option<f64>,
    /// Surface tension sigma, N/m, where the user gives one.
    pub surface_tension_n_per_m: Option<f64>,
}

impl Liquid {
    /// Surface tension used for the capillarity limit when the user gives none: water at 20 °C, the
    /// highest of the common tank liquids, so the limit errs to the careful side.
    ///
    /// Source: IAPWS R1-76(2014), evaluated with the open library CoolProp: 72.8168 mN/m.
    pub const FALLBACK_SURFACE_TENSION_N_PER_M: f64 = 0.072_816_8;

    /// Growth of pressure with depth along effective gravity, rho |G|, Pa/m.
    pub fn weight_pa_per_m(&self, gravity_m_per_s2: f64) -> f64 {
        self.density_kg_per_m3 * gravity_m_per_s2
    }

    /// The surface tension to use, N/m.
    pub fn surface_tension(&self) -> f64 {
        self.surface_tension_n_per_m.unwrap_or(Self::FALLBACK_SURFACE_TENSION_N_PER_M)
    }
}
