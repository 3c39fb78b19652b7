package casefile

import (
	"strconv"

	"go.yaml.in/yaml/v4"

	"standfast/lem"
)

// mapping builds a mapping node key by key.
type mapping struct{ node yaml.Node }

// put adds a key.
func (m *mapping) put(key string, v *yaml.Node) {
	m.node.Kind = yaml.MappingNode
	m.node.Content = append(m.node.Content, textNode(key), v)
}

// inline returns the mapping in braces, on one line if it fits.
func (m *mapping) inline() *yaml.Node {
	m.node.Kind, m.node.Style = yaml.MappingNode, yaml.FlowStyle
	return &m.node
}

// block returns the mapping with one key a line.
func (m *mapping) block() *yaml.Node {
	m.node.Kind = yaml.MappingNode
	return &m.node
}

func textNode(s string) *yaml.Node {
	return &yaml.Node{Kind: yaml.ScalarNode, Tag: "!!str", Value: s}
}

// numberNode returns a number with every digit it needs to be read back the same.
func numberNode(x float64) *yaml.Node {
	if x == 0 {
		x = 0 // no minus sign on nothing
	}
	return &yaml.Node{Kind: yaml.ScalarNode, Tag: "!!float", Value: strconv.FormatFloat(x, 'g', -1, 64)}
}

func trueNode() *yaml.Node { return &yaml.Node{Kind: yaml.ScalarNode, Tag: "!!bool", Value: "true"} }

// listNode returns a list with one item a line.
func listNode(items ...*yaml.Node) *yaml.Node {
	return &yaml.Node{Kind: yaml.SequenceNode, Content: items}
}

// rowNode returns a list in brackets.
func rowNode(items ...*yaml.Node) *yaml.Node {
	return &yaml.Node{Kind: yaml.SequenceNode, Style: yaml.FlowStyle, Content: items}
}

func numbersNode(x ...float64) *yaml.Node {
	row := rowNode()
	for _, v := range x {
		row.Content = append(row.Content, numberNode(v))
	}
	return row
}

func pointsNode(p []lem.Point) *yaml.Node {
	row := rowNode()
	for _, a := range p {
		row.Content = append(row.Content, numbersNode(a.X, a.Y))
	}
	return row
}
