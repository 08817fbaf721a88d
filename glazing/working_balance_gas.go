package glazing

// The working of gases by ISO 15099:2003, annex B: one gas, and mixtures by kinetic theory.

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"panewright/reference"
	"panewright/thermal"
)

const clauseGas = "ISO 15099, B"

// A gasShare is one gas of a filling, with its rows of the table.
type gasShare struct {
	name                              string
	share, mass                       float64
	conductivity, viscosity, capacity [2]float64 // a and b of a + b·T
}

// sharesOf returns the gases of a filling.
func sharesOf(m thermal.Mixture) (list []gasShare) {
	t := reference.GasesISO15099()
	mass := t.Column("molar_mass")
	line := func(name string, i int) [2]float64 {
		return [2]float64{t.Column(name + "_a")[i], t.Column(name + "_b")[i]}
	}
	for _, s := range m {
		if i := slices.Index(t.Labels, s.Gas); i >= 0 && s.Fraction > 0 {
			list = append(list, gasShare{s.Gas, s.Fraction, mass[i], line("conductivity", i), line("viscosity", i), line("heat_capacity", i)})
		}
	}
	return list
}

// linear writes out a + b·T at a temperature called Tm.
func linear(l [2]float64, tm float64) (formula, numbers string, value float64) {
	if l[1] == 0 {
		return "a of the table", put(l[0]), l[0]
	}
	return "a + b·Tm", put(l[0]) + " + " + put(l[1]) + "·" + put(tm), l[0] + float64(l[1]*tm)
}

const (
	unitConductivity = "W/(m·K)"
	unitViscosity    = "Pa·s"
	unitCapacity     = "J/(kg·K)"
)

// gas writes out the properties of a filling at a temperature called Tm.
func (c *Chapter) gas(m thermal.Mixture, tm float64, p thermal.Properties) {
	list := sharesOf(m)
	if len(list) > 1 {
		c.mixture(list, tm, p)
	} else {
		property := func(symbol, meaning string, l [2]float64, value float64, unit string) {
			formula, numbers, _ := linear(l, tm)
			c.step(symbol, meaning+" of "+list[0].name, formula, numbers, value, unit, clauseGas)
		}
		property("µ", "dynamic viscosity", list[0].viscosity, p.ViscosityPaS, unitViscosity)
		property("λ", "conductivity", list[0].conductivity, p.ConductivityWMK, unitConductivity)
		property("cp", "heat capacity", list[0].capacity, p.HeatCapacityJKGK, unitCapacity)
	}
	c.step("ρ", "density, ideal gas", "p·M/(R·Tm)", fmt.Sprintf("%s·%s/(%s·%s)", put(thermal.Pressure), put(p.MolarMass), put(thermal.GasConstant), put(tm)), p.DensityKGM3, "kg/m³", clauseGas)
}

// mixture writes out a filling of several gases, but for its density.
func (c *Chapter) mixture(list []gasShare, tm float64, p thermal.Properties) {
	var names, masses []string
	for i, g := range list {
		names = append(names, fmt.Sprintf("%d is %s, x%d %s", i+1, g.name, i+1, put(g.share)))
		masses = append(masses, put(g.share)+"·"+put(g.mass))
	}
	c.remark(strings.Join(names, "; ") + ". λ = λ′ + λ″, of translation and of what is within the molecule. In λ′ of the mixture ψ stands for φ; its first factor is φ itself, for λ′1/λ′2 is (µ1/µ2)·(M2/M1).")
	mu, translation, internal := make([]float64, len(list)), make([]float64, len(list)), make([]float64, len(list))
	for i, g := range list {
		n, of := strconv.Itoa(i+1), " of "+g.name
		formula, numbers, value := linear(g.viscosity, tm)
		mu[i] = value
		c.step("µ"+n, "dynamic viscosity"+of, formula, numbers, value, unitViscosity, clauseGas)
		formula, numbers, conductivity := linear(g.conductivity, tm)
		c.step("λ"+n, "conductivity"+of, formula, numbers, conductivity, unitConductivity, clauseGas)
		translation[i] = 15.0 / 4 * thermal.GasConstant / g.mass * mu[i]
		c.step("λ′"+n, "its part of translation", "15/4·R/M"+n+"·µ"+n, "15/4·"+put(thermal.GasConstant)+"/"+put(g.mass)+"·"+put(mu[i]), translation[i], unitConductivity, clauseGas)
		internal[i] = conductivity - translation[i]
		c.step("λ″"+n, "its part within the molecule", "λ"+n+" − λ′"+n, minus(conductivity, translation[i]), internal[i], unitConductivity, clauseGas)
	}
	plain, heavy := make([]pairSum, len(list)), make([]pairSum, len(list)) // of φ and ψ
	for i, a := range list {
		for j, b := range list {
			if i == j {
				continue
			}
			phi, psi := c.pair(i+1, j+1, a, b, mu[i], mu[j])
			ratio := func(symbol string) (formula string) {
				return fmt.Sprintf(" + %s%d%d·x%d/x%d", symbol, i+1, j+1, j+1, i+1)
			}
			plain[i].add(ratio("φ"), phi, b.share, a.share)
			heavy[i].add(ratio("ψ"), psi, b.share, a.share)
		}
	}
	// sum writes out Σ part/(1 + Σ pair).
	sum := func(symbol, meaning, part string, parts []float64, below []pairSum, value float64, unit string) {
		var formulas, numbers []string
		for i := range list {
			formulas = append(formulas, fmt.Sprintf("%s%d/(1%s)", part, i+1, below[i].formula))
			numbers = append(numbers, fmt.Sprintf("%s/(1%s)", put(parts[i]), below[i].numbers))
		}
		c.step(symbol, meaning, strings.Join(formulas, " + "), strings.Join(numbers, " + "), value, unit, clauseGas)
	}
	mixed := func(parts []float64, below []pairSum) (v float64) {
		for i := range parts {
			v += parts[i] / (1 + below[i].value)
		}
		return v
	}
	sum("µ", "dynamic viscosity of the mixture", "µ", mu, plain, p.ViscosityPaS, unitViscosity)
	l1, l2 := mixed(translation, heavy), mixed(internal, plain)
	sum("λ′", "part of translation", "λ′", translation, heavy, l1, unitConductivity)
	sum("λ″", "part within the molecules", "λ″", internal, plain, l2, unitConductivity)
	c.step("λ", "conductivity of the mixture", "λ′ + λ″", put(l1)+" + "+put(l2), p.ConductivityWMK, unitConductivity, clauseGas)
	c.step("M", "molar mass of the mixture", "Σ x·M", strings.Join(masses, " + "), p.MolarMass, "kg/kmol", clauseGas)
	var capacities []string
	for _, g := range list {
		_, numbers, _ := linear(g.capacity, tm)
		if g.capacity[1] != 0 {
			numbers = "(" + numbers + ")"
		}
		capacities = append(capacities, put(g.share)+"·"+put(g.mass)+"·"+numbers)
	}
	c.step("cp", "heat capacity of the mixture, by mole", "(Σ x·M·(a + b·Tm)) / M", "("+strings.Join(capacities, " + ")+") / "+put(p.MolarMass), p.HeatCapacityJKGK, unitCapacity, clauseGas)
}

// A pairSum is Σ φ·xj/xi, in formula and numbers.
type pairSum struct {
	formula, numbers string
	value            float64
}

func (s *pairSum) add(formula string, factor, other, own float64) {
	s.formula += formula
	s.numbers += " + " + put(factor) + "·" + put(other) + "/" + put(own)
	s.value += factor * other / own
}

// pair writes out φ and ψ of gases i and j, counted from 1.
func (c *Chapter) pair(i, j int, a, b gasShare, muA, muB float64) (phi, psi float64) {
	name := strconv.Itoa(i) + strconv.Itoa(j)
	root := 1 + float64(math.Sqrt(muA/muB)*math.Sqrt(math.Sqrt(b.mass/a.mass)))
	phi = root * root / (2 * math.Sqrt2 * math.Sqrt(1+a.mass/b.mass))
	both := a.mass + b.mass
	psi = phi * (1 + 2.41*(a.mass-b.mass)*(a.mass-0.142*b.mass)/(both*both))
	ma, mb := put(a.mass), put(b.mass)
	c.step("φ"+name, "of viscosity", fmt.Sprintf("(1 + (µ%d/µ%d)^(1/2)·(M%d/M%d)^(1/4))^2 / (2·2^(1/2)·(1 + M%d/M%d)^(1/2))", i, j, j, i, i, j),
		fmt.Sprintf("(1 + (%s/%s)^(1/2)·(%s/%s)^(1/4))^2 / (2·2^(1/2)·(1 + %s/%s)^(1/2))", put(muA), put(muB), mb, ma, ma, mb), phi, "", clauseGas)
	c.step("ψ"+name, "of conductivity", fmt.Sprintf("φ%s·(1 + 2.41·(M%d − M%d)·(M%d − 0.142·M%d) / (M%d + M%d)^2)", name, i, j, i, j, i, j),
		fmt.Sprintf("%s·(1 + 2.41·(%s − %s)·(%s − 0.142·%s) / (%s + %s)^2)", put(phi), ma, mb, ma, mb, ma, mb), psi, "", clauseGas)
	return phi, psi
}
