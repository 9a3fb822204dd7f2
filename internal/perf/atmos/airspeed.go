package atmos

import "math"

// Airspeeds other than true airspeed have types of their own, so that only an
// Air can turn one into another.
type (
	CAS  float64 // calibrated airspeed in m/s
	EAS  float64 // equivalent airspeed in m/s
	Mach float64 // Mach number, dimensionless
)

// impact is the pitot impact pressure in Pa at the Mach number m in air of
// static pressure p in Pa, subsonic isentropic flow: Liepmann and Roshko,
// Elements of Gasdynamics, 1957, eq. 2.45 with γ = 1.4.
func impact(p, m float64) float64 { return p * (math.Pow(1+0.2*m*m, 3.5) - 1) }

// machOf inverts impact.
func machOf(p, qc float64) float64 { return math.Sqrt(5 * (math.Pow(qc/p+1, 2.0/7) - 1)) }

// Mach gives the Mach number at the true airspeed tas in m/s.
func (a Air) Mach(tas float64) Mach { return Mach(tas / a.SoundSpeed) }

// EAS gives the equivalent airspeed at the true airspeed tas in m/s.
func (a Air) EAS(tas float64) EAS { return EAS(tas * math.Sqrt(a.Density/SeaLevelDensity)) }

// CAS gives the calibrated airspeed at the true airspeed tas in m/s, subsonic.
func (a Air) CAS(tas float64) CAS {
	qc := impact(a.Pressure, tas/a.SoundSpeed)
	return CAS(SeaLevelSoundSpeed * machOf(SeaLevelPressure, qc))
}

// FromCAS gives the true airspeed in m/s at the calibrated airspeed c, subsonic.
func (a Air) FromCAS(c CAS) float64 {
	qc := impact(SeaLevelPressure, float64(c)/SeaLevelSoundSpeed)
	return a.SoundSpeed * machOf(a.Pressure, qc)
}

// FromEAS gives the true airspeed in m/s at the equivalent airspeed e.
func (a Air) FromEAS(e EAS) float64 { return float64(e) / math.Sqrt(a.Density/SeaLevelDensity) }

// FromMach gives the true airspeed in m/s at the Mach number m.
func (a Air) FromMach(m Mach) float64 { return float64(m) * a.SoundSpeed }
