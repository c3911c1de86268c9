package lipid

// Atomic weights in thousandths: C 12.011, H 1.008, O 15.999. Reference: IUPAC abridged standard atomic weights, as the
// factor tables of AOAC 2012.13 Table A are reproduced by them.
const (
	milliC = 12011
	milliH = 1008
	milliO = 15999

	milliMethylene = milliC + 2*milliH                                    // acid to methyl ester
	milliGlyceryl  = 3*milliC + 8*milliH + 3*milliO - 3*(2*milliH+milliO) // glycerol less three water: 38.049
)

// Form is the form in which fatty acids are weighed.
type Form uint8

// The forms of the conversion tables.
const (
	FreeAcid Form = iota
	MethylEster
	Triglyceride // three of the same acid on glycerol
)

func (f Form) String() string {
	return [...]string{"free acid", "methyl ester", "triglyceride"}[min(f, Triglyceride)]
}

// Formula counts carbon, hydrogen and oxygen of the acid. A group with a known number of carbons and double bonds has one
// too; ok is false when the notation leaves them open.
func (s Species) Formula() (c, h, o int, ok bool) {
	if !s.IsGroup() {
		c, h, o = s.acid.Formula()
		return c, h, o, true
	}
	c, d := s.Carbons(), s.DoubleBonds()
	if c < 0 || d < 0 {
		return 0, 0, 0, false
	}
	return c, 2 * (c - d), 2, true
}

// AcidMass is the molar mass of the free acid in mg/mol, exact from the atomic weights above.
func (s Species) AcidMass() (milli int64, ok bool) {
	c, h, o, ok := s.Formula()
	return int64(c)*milliC + int64(h)*milliH + int64(o)*milliO, ok
}

// FAMEMass is the molar mass of the fatty acid methyl ester in mg/mol.
func (s Species) FAMEMass() (milli int64, ok bool) { return s.Mass(MethylEster) }

// TriglycerideMass is the molar mass in mg/mol of the triglyceride of three such acids: 3 M(acid) + 38049.
func (s Species) TriglycerideMass() (milli int64, ok bool) { return s.Mass(Triglyceride) }

// Mass is the molar mass in mg/mol of the given form.
func (s Species) Mass(form Form) (milli int64, ok bool) {
	m, ok := s.AcidMass()
	if !ok {
		return 0, false
	}
	switch form {
	case MethylEster:
		m += milliMethylene
	case Triglyceride:
		m = 3*m + milliGlyceryl
	}
	return m, true
}

// ConversionFactor is the exact factor num/den from grams of one form to grams of another. Geometry and position of the
// double bonds do not change it. ok is false when the notation leaves the mass open.
func (s Species) ConversionFactor(from, to Form) (num, den int64, ok bool) {
	den, ok = s.Mass(from)
	if !ok {
		return 0, 0, false
	}
	num, _ = s.Mass(to)
	return num * acidsIn(from), den * acidsIn(to), true
}

func acidsIn(f Form) int64 {
	if f == Triglyceride {
		return 3
	}
	return 1
}

// milliIodine is the molar mass of I2 in mg/mol, with I = 126.90: the value that reproduces the factors of AOCS Cd 1c-85.
const milliIodine = 253800

// IodineFactor is the exact factor num/den of the calculated iodine value: grams of iodine taken up by one gram of the given
// form, so that the percentage of the acid times the factor is its share of the iodine value (g I2 per 100 g). Choose
// [Triglyceride] for percentages of fatty acids in a fat, [FreeAcid] for grams of acid per 100 g. Cis and trans count
// alike. ok is false when the notation leaves carbons or double bonds open.
//
// Reference: AOCS Cd 1c-85; ISO 3961 Annex B. Not meant for fish oils or for fats with much unsaponifiable matter.
func (s Species) IodineFactor(form Form) (num, den int64, ok bool) {
	den, ok = s.Mass(form)
	if !ok {
		return 0, 0, false
	}
	return acidsIn(form) * int64(s.DoubleBonds()) * milliIodine, den, true
}
