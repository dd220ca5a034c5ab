package view

// Cautions are shown wherever somebody could take a number to the bench: start page, sheet, print. The last words of
// each sentence are what a person with a meter in hand needs first, so they are kept short.
func Cautions() []string {
	return []string{
		"For competent persons. Local code and licensed practice come first.",
		"Before touching: isolate, prove the tester, prove dead, prove the tester again, and mind stored energy.",
		"Above 50 V AC or 120 V DC (IEC 61140) a touch can kill.",
		"A circuit drawn here is no safety function unless it has been assessed as one (ISO 13849-1, IEC 62061).",
		"Left out: transients, electromagnetic disturbance, contact bounce, temperature rise, any tolerance not entered.",
	}
}
