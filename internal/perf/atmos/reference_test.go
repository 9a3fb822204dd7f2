package atmos_test

import (
	"math"
	"testing"

	"legwright/internal/perf/atmos"
	"legwright/internal/perf/reference"
)

func air(t *testing.T, d atmos.Day, hp float64) atmos.Air {
	t.Helper()
	a, err := d.At(hp, nil)
	if err != nil {
		t.Fatal(err)
	}
	return a
}

// at is the day on which the air at hp, in m, has the temperature and humidity given.
func at(t *testing.T, hp, temperature, humidity float64) atmos.Air {
	t.Helper()
	day, err := atmos.Spec{Given: atmos.ByTemperature, Temperature: temperature, Humidity: humidity}.Day(hp)
	if err != nil {
		t.Fatal(err)
	}
	a := air(t, day, hp)
	if math.Abs(a.Temperature-temperature) > 1e-9 {
		t.Fatalf("asked for %v K at %v m, got %v", temperature, hp, a.Temperature)
	}
	return a
}

func TestStandardAtmosphere(t *testing.T) {
	for _, row := range reference.Read(t, "standard_atmosphere") {
		a := air(t, atmos.Day{}, row.SI("altitude"))
		row.Near("temperature", a.Temperature)
		row.Near("pressure", a.Pressure)
		row.Near("density", a.Density)
		row.Near("sound_speed", a.SoundSpeed)
		row.Near("viscosity", a.Viscosity)
		if a.DryDensity != a.Density || a.HeightRatio != 1 || a.PressureAltitude != row.SI("altitude") {
			t.Errorf("%s: dry standard air is %+v", row, a)
		}
	}
}

func TestPublishedRatios(t *testing.T) {
	ground := air(t, atmos.Day{}, 0)
	for _, row := range reference.Read(t, "standard_atmosphere_ratios") {
		a := air(t, atmos.Day{}, row.SI("altitude"))
		row.Near("pressure_ratio", a.Pressure/ground.Pressure)
		row.Near("density_ratio", a.Density/ground.Density)
		row.Near("viscosity_ratio", a.Viscosity/ground.Viscosity)
		row.Near("sound_speed", a.SoundSpeed)
	}
}

func TestHumidAir(t *testing.T) {
	for _, row := range reference.Read(t, "humid_air") {
		a := at(t, 0, row.SI("temperature"), row.Num("humidity"))
		row.Near("two_gas_density", a.Density)
		row.Near("cipm_density", a.Density)
	}
	for _, row := range reference.Read(t, "humid_air_oxygen") {
		wet, dry := at(t, 0, row.SI("temperature"), row.Num("humidity")), at(t, 0, row.SI("temperature"), 0)
		row.Near("ratio", wet.DryDensity/dry.DryDensity)
	}
}

func TestDensityAltitude(t *testing.T) {
	for _, row := range reference.Read(t, "density_altitude") {
		row.Near("density_altitude", at(t, row.SI("pressure_altitude"), row.SI("temperature"), 0).DensityAltitude())
	}
}

func TestPressureAltitude(t *testing.T) {
	for _, row := range reference.Read(t, "pressure_altitude_faa") {
		row.Near("pressure_altitude", atmos.PressureAltitude(row.SI("elevation"), row.SI("qnh")))
	}
}

func TestAirspeeds(t *testing.T) {
	for _, row := range reference.Read(t, "airspeeds") {
		a := air(t, atmos.Day{}, row.SI("altitude"))
		tas := a.FromCAS(atmos.CAS(row.SI("cas")))
		row.Near("tas", tas)
		if row.Has("mach") {
			row.Near("mach", float64(a.Mach(tas)))
		}
		if row.Has("eas") {
			row.Near("eas", float64(a.EAS(tas)))
		}
	}
}
