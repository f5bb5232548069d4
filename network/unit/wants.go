package unit

// wants are the ready-made wants in the order of their table.
var wants []Want

// ready makes a want and lists it.
func ready(name, unit string) Want {
	w := NewWant(name, unit)
	wants = append(wants, w)
	return w
}

// The kinds of quantities that a netlist deals in. Where two share a dimension
// both names are given in a fault.
var (
	Number                  = ready("plain number", "")
	Temperature             = ready("temperature level", "degC")
	TemperatureDifference   = ready("temperature difference", "K")
	TemperatureRate         = ready("temperature rate", "K/s")
	Mass                    = ready("mass", "kg")
	MassFlow                = ready("mass flow", "kg/s")
	Length                  = ready("length", "m")
	Area                    = ready("area", "m^2")
	Volume                  = ready("volume", "m^3")
	VolumeFlow              = ready("volume flow", "m^3/s")
	Time                    = ready("time", "s")
	Frequency               = ready("frequency", "Hz")
	Speed                   = ready("speed", "m/s")
	Acceleration            = ready("acceleration", "m/s^2")
	Angle                   = ready("angle", "rad")
	AngularSpeed            = ready("angular speed", "rad/s")
	AngularAcceleration     = ready("angular acceleration", "rad/s^2")
	Force                   = ready("force", "N")
	Energy                  = ready("energy", "J")
	Torque                  = ready("torque", "N m")
	Power                   = ready("power", "W")
	Pressure                = ready("pressure", "Pa")
	Stress                  = ready("stress", "MPa")
	Density                 = ready("density", "kg/m^3")
	Inertia                 = ready("moment of inertia", "kg m^2")
	HeatCapacity            = ready("heat capacity", "J/K")
	SpecificHeat            = ready("specific heat", "J/(kg K)")
	SpecificEnergy          = ready("specific energy", "J/kg")
	EnergyDensity           = ready("energy per area", "J/m^2")
	Conductance             = ready("conductance", "W/K")
	ThermalResistance       = ready("thermal resistance", "K/W")
	Conductivity            = ready("thermal conductivity", "W/(m K)")
	HeatTransferCoefficient = ready("heat transfer coefficient", "W/(m^2 K)")
	HeatFlux                = ready("heat flux", "W/m^2")
	KinematicViscosity      = ready("kinematic viscosity", "m^2/s")
	ThermalDiffusivity      = ready("thermal diffusivity", "m^2/s")
	DynamicViscosity        = ready("dynamic viscosity", "Pa s")
	Expansion               = ready("expansion coefficient", "K^-1")
	Stiffness               = ready("stiffness", "N/m")
	Damping                 = ready("damping coefficient", "N s/m")
	AngularStiffness        = ready("angular stiffness", "N m/rad")
	AngularDamping          = ready("angular damping coefficient", "N m s/rad")
	Current                 = ready("electric current", "A")
	Voltage                 = ready("voltage", "V")
	Resistance              = ready("electric resistance", "ohm")
	Amount                  = ready("amount of substance", "mol")
)

// RoadSpeed is a speed as it is shown for a vehicle on the road.
var RoadSpeed = NewWant("speed", "km/h")
