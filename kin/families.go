package kin

// Families are all families, in the order in which they are listed.
func Families() []*Family {
	return []*Family{
		sixUPS(),
		sixRUS(),
		sixPUS(),
		threeRPR(),
		threeRRR(),
		fiveBar(),
		threeRPS(),
		delta(),
		delta4(),
		linearDelta(),
		levelArm(),
	}
}

// FamilyNamed is the family of that name, or nil.
func FamilyNamed(name string) *Family {
	for _, f := range Families() {
		if f.Name == name {
			return f
		}
	}
	return nil
}
