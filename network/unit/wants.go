package unit

// The kinds of quantities that a netlist deals in. Where two share a dimension
// the first is the one a value is shown in when nothing else is known.
var (
	Number                  = NewWant("plain number", "")
	Temperature             = NewWant("temperature level", "degC")
	TemperatureDifference   = NewWant("temperature difference", "K")
	TemperatureRate         = NewWant("temperature rate", "K/s")
	Mass                    = NewWant("mass", "kg")
	MassFlow                = NewWant("mass flow", "kg/s")
	Length                  = NewWant("length", "m")
	Area                    = NewWant("area", "m^2")
	Volume                  = NewWant("volume", "m^3")
	VolumeFlow              = NewWant("volume flow", "m^3/s")
	Time                    = NewWant("time", "s")
	Frequency               = NewWant("frequency", "Hz")
	Speed                   = NewWant("speed", "m/s")
	Acceleration            = NewWant("acceleration", "m/s^2")
	Angle                   = NewWant("angle", "rad")
	AngularSpeed            = NewWant("angular speed", "rad/s")
	AngularAcceleration     = NewWant("angular acceleration", "rad/s^2")
	Force                   = NewWant("force", "N")
	Energy                  = NewWant("energy", "J")
	Torque                  = NewWant("torque", "N m")
	Power                   = NewWant("power", "W")
	Pressure                = NewWant("pressure", "Pa")
	Stress                  = NewWant("stress", "MPa")
	Density                 = NewWant("density", "kg/m^3")
	Inertia                 = NewWant("moment of inertia", "kg m^2")
	HeatCapacity            = NewWant("heat capacity", "J/K")
	SpecificHeat            = NewWant("specific heat", "J/(kg K)")
	SpecificEnergy          = NewWant("specific energy", "J/kg")
	EnergyDensity           = NewWant("energy per area", "J/m^2")
	Conductance             = NewWant("conductance", "W/K")
	ThermalResistance       = NewWant("thermal resistance", "K/W")
	Conductivity            = NewWant("thermal conductivity", "W/(m K)")
	HeatTransferCoefficient = NewWant("heat transfer coefficient", "W/(m^2 K)")
	HeatFlux                = NewWant("heat flux", "W/m^2")
	KinematicViscosity      = NewWant("kinematic viscosity", "m^2/s")
	ThermalDiffusivity      = NewWant("thermal diffusivity", "m^2/s")
	DynamicViscosity        = NewWant("dynamic viscosity", "Pa s")
	Expansion               = NewWant("expansion coefficient", "K^-1")
	Stiffness               = NewWant("stiffness", "N/m")
	Damping                 = NewWant("damping coefficient", "N s/m")
	AngularStiffness        = NewWant("angular stiffness", "N m/rad")
	AngularDamping          = NewWant("angular damping coefficient", "N m s/rad")
	Current                 = NewWant("electric current", "A")
	Voltage                 = NewWant("voltage", "V")
	Resistance              = NewWant("electric resistance", "ohm")
	Amount                  = NewWant("amount of substance", "mol")
)

// wants is filled in init because naming a dimension in a fault refers back to it.
var wants []Want

func init() {
	wants = []Want{
		Number, Temperature, TemperatureDifference, TemperatureRate,
		Mass, MassFlow, Length, Area, Volume, VolumeFlow,
		Time, Frequency, Speed, Acceleration, Angle, AngularSpeed, AngularAcceleration,
		Force, Energy, Torque, Power, Pressure, Stress, Density, Inertia,
		HeatCapacity, SpecificHeat, SpecificEnergy, EnergyDensity,
		Conductance, ThermalResistance, Conductivity, HeatTransferCoefficient, HeatFlux,
		KinematicViscosity, ThermalDiffusivity, DynamicViscosity, Expansion,
		Stiffness, Damping, AngularStiffness, AngularDamping,
		Current, Voltage, Resistance, Amount,
	}
}

// Wants returns all ready-made wants in the order of their table.
func Wants() []Want { return append([]Want(nil), wants...) }

// wantOf returns the want in which a quantity is shown when nothing else is
// known about it.
func wantOf(q Quantity) (Want, bool) {
	if q.Temp == Level {
		return Temperature, true
	}
	for _, w := range wants {
		if w.scale.Dim == q.Dim && !w.Level {
			return w, true
		}
	}
	return Want{}, false
}
