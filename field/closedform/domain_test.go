package closedform_test

import (
	"math"
	"testing"
)

// lengths gives the flat positions of the arguments that must be finite and positive.
var lengths = map[string][]int{
	"TwoPolePotential": {1}, "TwoPoleField": {1}, "DipoleAxialDistance": {0, 1},
	"SpherePotential": {3}, "SphereField": {3}, "HollowSpherePotential": {3, 4}, "HollowSphereField": {3, 4},
	"ChargedShellPotential": {1}, "ChargedShellField": {1}, "ChargedSpherePotential": {1}, "ChargedSphereField": {1},
	"CentralPowerPotential": {2}, "CentralPowerField": {2}, "CentralPowerCharge": {2}, "CentralPowerDensity": {2},
	"RadialPowerPotential": {2}, "RadialPowerField": {2}, "RadialPowerCharge": {3, 4}, "RadialPowerDensity": {2},
	"AxialPowerCharge": {4}, "RingAxisPotential": {1}, "RingAxisField": {1}, "DiscAxisPotential": {1}, "DiscAxisField": {1},
	"AnnulusAxisPotential": {1, 2}, "AnnulusAxisField": {1, 2}, "DiscRimPotential": {1}, "DiscSelfEnergy": {1},
	"DiscPairForce": {2, 3}, "DiscPairEnergy": {2, 3}, "CoaxialCylinderForce": {2, 3, 4, 5},
	"CoaxialPairForce": {2, 3, 4, 5, 6}, "CuboidForce": {2, 3, 4, 5, 6, 7},
	"CylinderAxisPotential": {1, 2}, "CylinderAxisField": {1, 2}, "CylinderAxisInduction": {1, 2}, "TwoDiscAxisField": {1, 2},
	"ChargedCylinderAxisField": {1, 2}, "LinearCylinderAxisField": {1, 2}, "FaceCentreInduction": {1, 2},
	"TubeAxisPotential": {1, 2, 3}, "TubeAxisField": {1, 2, 3}, "RadialTubeAxisField": {1, 2, 3},
	"CylinderCentreFactor": {0, 1}, "CylinderMagnetometricFactor": {0, 1}, "CylinderTransverseFactor": {0, 1}, "CylinderFluxmetricFactor": {0, 1},
	"SlabField": {3}, "SlabPotential": {3}, "ChargedSlabField": {1}, "EndlessCylinderPotential": {3}, "EndlessCylinderField": {3},
	"LinePotential": {1, 2}, "LineField": {1}, "SegmentPotential": {1}, "SlantedEnd": {1}, "ContactPull": {1}, "OperatingPoint": {2},
	"EllipsoidFactors": {0, 1, 2}, "EllipticCylinderFactors": {0, 1}, "EllipsoidInnerField": {3, 4, 5}, "EllipsoidSelfEnergy": {3, 4, 5},
	"EllipsoidAxisField": {1, 2, 3}, "ProlateFactors": {0}, "OblateFactors": {0}, "BoxMagnetometricFactor": {0, 1, 2},
	"BoxCentreFactor": {0, 1, 2}, "BoxAxisInduction": {1, 2, 3}, "BoxCentrePotential": {1, 2, 3}, "CubeCentrePotential": {1}, "CubeCornerPotential": {1},
	"RectangleAxisPotential": {1, 2}, "RectangleAxisField": {1, 2}, "RectangleSelfEnergy": {1, 2}, "SquareCentrePotential": {1},
	"ImageChargeForce": {2}, "ImageDipoleForce": {2}, "ImageDipoleEnergy": {2},
	"CoatedSpherePolarizability": {2, 3}, "CoatedSphereCoreRatio": {2, 3},
	"SphericalShieldRatio": {0, 1, 2}, "SphericalShieldMoment": {0, 1, 2}, "CylindricalShieldRatio": {0, 1, 2},
	"HalbachField": {1, 2}, "HalbachCentreField": {1, 2, 3}, "HalbachQuadrupoleGradient": {1, 2}, "HalbachArrayField": {1, 2},
	"LoopAxisField": {1}, "SegmentField": {1, 2}, "CoaxialLoopInductance": {0, 1},
	"ElectretPotential": {1, 2}, "ElectretGapField": {1, 2, 3},
}

// ordered gives the position of the smaller of two lengths that must increase.
var ordered = map[string]int{
	"HollowSpherePotential": 3, "HollowSphereField": 3, "RadialPowerCharge": 2, "AxialPowerCharge": 2, "AxialPowerSlabField": 2,
	"AxialPowerSlabVoltage": 2, "AnnulusAxisPotential": 1, "AnnulusAxisField": 1, "TubeAxisPotential": 1, "TubeAxisField": 1,
	"RadialTubeAxisField": 1, "CoatedSpherePolarizability": 2, "CoatedSphereCoreRatio": 2, "SphericalShieldRatio": 1,
	"SphericalShieldMoment": 1, "CylindricalShieldRatio": 1, "HalbachField": 1, "HalbachCentreField": 1, "HalbachQuadrupoleGradient": 1,
}

// TestLengths puts zero, a negative and an infinite value into every length, and swaps
// or equates every ordered pair: all results are NaN.
func TestLengths(t *testing.T) {
	refuse := func(name string, x []float64) {
		for _, y := range call(t, name, x) {
			if !math.IsNaN(y) {
				t.Errorf("%s%v = %v, want NaN", name, x, y)
			}
		}
	}
	good := sample(t)
	for name, at := range lengths {
		for _, i := range at {
			for _, v := range []float64{0, -1, math.Inf(1)} {
				x := append([]float64(nil), good[name]...)
				x[i] = v
				refuse(name, x)
			}
		}
	}
	for name, i := range ordered {
		x := append([]float64(nil), good[name]...)
		x[i], x[i+1] = x[i+1], x[i]
		refuse(name, x)
		x[i] = x[i+1]
		refuse(name, x)
	}
}
