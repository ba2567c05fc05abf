package study

import (
	"legwright/cmd/legwright/internal/units"
	"legwright/kin"
	"legwright/objective"
)

// KindOf is the kind of quantity that has the SI unit, a bare number for "", "1" and unknown units.
func KindOf(unit string) units.Kind {
	all := []units.Kind{units.Length, units.Angle, units.Force, units.Torque, units.Speed, units.AngularSpeed,
		units.Power, units.Stiffness, units.TurnStiffness, units.Mass, units.Gain}
	for _, k := range all {
		if k.SI() == unit {
			return k
		}
	}
	return units.Ratio
}

// MeasureKind is the kind of quantity that the named measure has for machines of the family, a bare
// number if there is no such measure.
func MeasureKind(family, name string) units.Kind {
	m := objective.MeasureNamed(name)
	if m == nil {
		return units.Ratio
	}
	if f := kin.FamilyNamed(family); f != nil {
		return UnitKind(m.UnitOf(f))
	}
	return UnitKind(m.Unit)
}

// DimensionKind is the kind of quantity of a family's dimension, a bare number if there is no such dimension.
func DimensionKind(family, name string) units.Kind {
	if f := kin.FamilyNamed(family); f != nil {
		if i := f.Index(name); i >= 0 {
			return DimensionUnit(f.Dimensions[i].Unit)
		}
	}
	return units.Ratio
}

// DimensionUnit is the kind of quantity of dimensions in the unit.
func DimensionUnit(u kin.Unit) units.Kind {
	switch u {
	case kin.Radian:
		return units.Angle
	case kin.Sign:
		return units.Sign
	}
	return units.Length
}

// UnitKind is the kind of quantity of measures in the unit.
func UnitKind(u objective.Unit) units.Kind {
	switch u {
	case objective.Metre:
		return units.Length
	case objective.Radian:
		return units.Angle
	case objective.Newton:
		return units.Force
	case objective.NewtonMetre:
		return units.Torque
	case objective.MetrePerSecond:
		return units.Speed
	case objective.RadianPerSecond:
		return units.AngularSpeed
	case objective.Watt:
		return units.Power
	case objective.NewtonPerMetre:
		return units.Stiffness
	case objective.NewtonMetrePerRadian:
		return units.TurnStiffness
	case objective.MetrePerRadian:
		return units.Gain
	}
	return units.Ratio
}

// rotary tells whether the family's actuators turn.
func rotary(family string) bool {
	f := kin.FamilyNamed(family)
	return f != nil && f.Drive == kin.Rotary
}

// DriveKinds are the kinds of a family's actuator coordinate, effort and rate.
func DriveKinds(family string) (coordinate, effort, rate units.Kind) {
	if rotary(family) {
		return units.Angle, units.Torque, units.AngularSpeed
	}
	return units.Length, units.Force, units.Speed
}
