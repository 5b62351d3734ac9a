"""What the assessor states: frozen models of the assessment file and the policy, read without computing anything."""
