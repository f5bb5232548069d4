package problems

// All returns every problem with a published answer, each made anew.
func All() []*Case {
	return []*Case{
		Robertson(), Hires(), Oregonator(), E5(), Pollution(), ChemicalAkzoNobel(),
		VanDerPol(), VanDerPolFast(), TransistorAmplifier(), RingModulator(),
		MedicalAkzoNobel(), Brusselator(), Pleiades(), Arenstorf(), ProtheroRobinson(-1e6, 10),
	}
}
